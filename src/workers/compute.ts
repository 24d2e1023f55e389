import { availableParallelism } from 'node:os';
import { Piscina } from 'piscina';
import type { Compute, Simulation } from '../approval/compute.ts';
import type { Pulse, PulseAnalysis } from '../evidence/pulse.ts';
import { requireUsable, resultOf } from '../metrology/monte-carlo.ts';
import { type Block, blocksOf } from '../metrology/trials.ts';
import { InvalidQuantity, within } from '../physics/invalid-quantity.ts';

/** What a thread is told: some blocks of a simulation. */
export interface SimulationTask extends Omit<Simulation, 'options'> {
  readonly blocks: readonly Block[];
}

/** What it answers: the samples, block by block. */
export interface SimulationShare {
  readonly outputNames: readonly string[];
  readonly samples: readonly Float64Array[];
}

/** A thread's answer: its result, or what the request's numbers were refused for, which as an error would not cross whole. */
export type Answered<T> =
  | { readonly result: T }
  | { readonly refused: { readonly pointer: string; readonly detail: string } };

/**
 * A pool of as many threads as there are processors, started on first use. Blocks are dealt out in stripes and put back in order,
 * so the answer depends on the seed alone and not on the number of threads.
 */
export function createCompute(threads = Math.max(1, availableParallelism())): Compute {
  let pool: Piscina | undefined;
  const run = async <T>(name: 'simulate' | 'pulse', task: object): Promise<T> => {
    pool ??= new Piscina({
      filename: new URL('./compute-thread.ts', import.meta.url).href,
      minThreads: threads,
      maxThreads: threads,
    });
    const answer: Answered<T> = await pool.run(task, { name });
    if ('refused' in answer) throw new InvalidQuantity(answer.refused.pointer, answer.refused.detail);
    return answer.result;
  };
  return {
    async simulate({ options, ...simulation }) {
      requireUsable(options);
      const blocks = blocksOf(options.seed, options.trials);
      const stripes = Array.from({ length: Math.min(threads, blocks.length) }, (_, stripe) =>
        blocks.filter(({ index }) => index % threads === stripe),
      );
      const shares = await Promise.all(
        stripes.map((stripe) =>
          run<SimulationShare>('simulate', { ...simulation, blocks: stripe } satisfies SimulationTask),
        ),
      );
      const samples: Float64Array[] = [];
      for (const [stripe, share] of shares.entries()) {
        for (const [k, block] of share.samples.entries()) samples[stripes[stripe]![k]!.index] = block;
      }
      return within('/uncertainty', () => resultOf(shares[0]?.outputNames ?? [], samples, options));
    },
    analysePulse: (pulse: Pulse) => run<PulseAnalysis>('pulse', pulse),
    close: async () => pool?.destroy(),
  };
}
