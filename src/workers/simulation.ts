import { availableParallelism } from 'node:os';
import { Piscina } from 'piscina';
import type { Simulation, Simulator } from '../approval/simulator.ts';
import { requireUsable, resultOf } from '../metrology/monte-carlo.ts';
import { type Block, blocksOf } from '../metrology/trials.ts';
import { InvalidQuantity, within } from '../physics/invalid-quantity.ts';

/** What a thread is told: some blocks of a simulation. */
export interface SimulationTask extends Omit<Simulation, 'options'> {
  readonly blocks: readonly Block[];
}

/** What it answers: the samples block by block, or what the request's numbers were refused for. */
export type SimulationShare =
  | { readonly outputNames: readonly string[]; readonly samples: readonly Float64Array[] }
  | { readonly refused: { readonly pointer: string; readonly detail: string } };

/**
 * A pool of as many threads as there are processors, started on first use. Blocks are dealt out in stripes and put back in order,
 * so the answer depends on the seed alone and not on the number of threads.
 */
export function createSimulator(threads = Math.max(1, availableParallelism())): Simulator {
  let pool: Piscina<SimulationTask, SimulationShare> | undefined;
  return {
    async simulate({ options, ...simulation }) {
      requireUsable(options);
      pool ??= new Piscina({
        filename: new URL('./simulation-thread.ts', import.meta.url).href,
        minThreads: threads,
        maxThreads: threads,
      });
      const blocks = blocksOf(options.seed, options.trials);
      const stripes = Array.from({ length: Math.min(threads, blocks.length) }, (_, stripe) =>
        blocks.filter(({ index }) => index % threads === stripe),
      );
      const running = pool;
      const shares = await Promise.all(stripes.map((stripe) => running.run({ ...simulation, blocks: stripe })));
      const samples: Float64Array[] = [];
      let outputNames: readonly string[] = [];
      shares.forEach((share, stripe) => {
        if ('refused' in share) throw new InvalidQuantity(share.refused.pointer, share.refused.detail);
        outputNames = share.outputNames;
        share.samples.forEach((block, k) => {
          samples[stripes[stripe]![k]!.index] = block;
        });
      });
      return within('/uncertainty', () => resultOf(outputNames, samples, options));
    },
    close: async () => pool?.destroy(),
  };
}
