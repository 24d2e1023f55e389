/**
 * A million Monte Carlo trials of the energy ½·L·I² in a solenoid, diameter, length and current uncertain, on two
 * worker threads, and the same trials vectorised in numpy and scipy in the same run. Prints the ratio of the times,
 * ours over numpy's.
 *
 * node test/bench/monte-carlo.bench.ts
 */
import { spawnSync } from 'node:child_process';
import { once } from 'node:events';
import { loadavg } from 'node:os';
import { Worker } from 'node:worker_threads';
import { type MonteCarloResult, resultOf } from '../../src/metrology/monte-carlo.ts';
import { blocksOf } from '../../src/metrology/trials.ts';
import type { Task } from './monte-carlo.worker.ts';

const TRIALS = 1_000_000;
const THREADS = 2;
const REPETITIONS = 9;
const COIL = { shape: 'solenoid', turns: 100, diameter_m: 0.03, length_m: 0.06 } as const;
const CURRENT_A = 10;
const UNCERTAINTY = { diameter_m: 1e-5, length_m: 1e-4, current_A: 0.02 };

interface Numpy {
  readonly milliseconds: readonly number[];
  readonly processorMilliseconds: readonly number[];
  readonly numpy: string;
  readonly mean: number;
  readonly standardUncertainty: number;
}

/** From the request to the summary: the blocks dealt out to the threads, their samples back in order, one summary. */
async function ours(pool: readonly Worker[], route: Task['route'], seed: number): Promise<MonteCarloResult> {
  const blocks = blocksOf(seed, TRIALS);
  const answers = await Promise.all(
    pool.map(async (worker, thread) => {
      const answer = once(worker, 'message');
      const task: Task = {
        route,
        coil: COIL,
        current_A: CURRENT_A,
        uncertainty: UNCERTAINTY,
        blocks: blocks.filter(({ index }) => index % THREADS === thread),
      };
      worker.postMessage(task);
      return (await answer)[0] as { outputNames: string[]; blocks: Float64Array[] };
    }),
  );
  const inOrder = blocks.map(({ index }) => answers[index % THREADS]!.blocks[Math.floor(index / THREADS)]!);
  return resultOf(answers[0]!.outputNames, inOrder, { trials: TRIALS, seed });
}

async function timed(pool: readonly Worker[], route: Task['route']) {
  const milliseconds: number[] = [];
  const processorMilliseconds: number[] = [];
  let result = await ours(pool, route, 0);
  for (let seed = 1; seed <= REPETITIONS; seed++) {
    const before = process.cpuUsage();
    const start = performance.now();
    result = await ours(pool, route, seed);
    milliseconds.push(performance.now() - start);
    const { user, system } = process.cpuUsage(before);
    processorMilliseconds.push((user + system) / 1e3);
  }
  return { milliseconds, processorMilliseconds, energy: result.outputs.energy_J! };
}

function numpy(): Numpy | null {
  const { status, stdout, error } = spawnSync('python3', [new URL('monte_carlo_numpy.py', import.meta.url).pathname], {
    input: JSON.stringify({
      trials: TRIALS,
      repetitions: REPETITIONS,
      turns: COIL.turns,
      diameter_m: [COIL.diameter_m, UNCERTAINTY.diameter_m],
      length_m: [COIL.length_m, UNCERTAINTY.length_m],
      current_A: [CURRENT_A, UNCERTAINTY.current_A],
    }),
    encoding: 'utf8',
  });
  return error || status !== 0 ? null : (JSON.parse(stdout) as Numpy);
}

function median(values: readonly number[]): number {
  return values.toSorted((a, b) => a - b)[Math.floor(values.length / 2)]!;
}

const least = (values: readonly number[]) => Math.min(...values);

interface Times {
  readonly milliseconds: readonly number[];
  /** Of all threads together. */
  readonly processorMilliseconds: readonly number[];
}

function line(name: string, { milliseconds, processorMilliseconds }: Times): string {
  const numbers = [median(milliseconds), least(milliseconds), median(processorMilliseconds)].map((ms) =>
    ms.toFixed(0).padStart(5),
  );
  return `${name.padEnd(46)} median ${numbers[0]} ms, least ${numbers[1]} ms, processor time ${numbers[2]} ms`;
}

const pool = Array.from({ length: THREADS }, () => new Worker(new URL('monte-carlo.worker.ts', import.meta.url)));
// A pool that has served before, as the service's has.
for (let run = 0; run < 3; run++) await ours(pool, 'formula', run);
const formula = await timed(pool, 'formula');
const theirs = numpy();
const calculation = await timed(pool, 'calculation');
await Promise.all(pool.map((worker) => worker.terminate()));

console.log(
  `${TRIALS} trials of a solenoid's energy, ${THREADS} threads, from request to summary (load ${loadavg()[0]!.toFixed(1)}):`,
);
console.log(line('½·L·I², record in, one output', formula));
console.log(line('the whole energy calculation, all its outputs', calculation));
if (theirs === null) {
  console.log('python3 with numpy and scipy is not here: nothing to compare with.');
} else {
  console.log(line(`numpy ${theirs.numpy}, one output`, theirs));
  const difference = Math.abs(formula.energy.mean - theirs.mean) / theirs.standardUncertainty;
  const chance = Math.SQRT2 / Math.sqrt(TRIALS);
  console.log(
    `means differ by ${difference.toExponential(1)} standard uncertainties (chance: ${chance.toExponential(1)})`,
  );
  for (const [name, times] of [
    ['½·L·I²', formula],
    ['the whole calculation', calculation],
  ] as const) {
    const ratios = [median, least].map((of) => (of(times.milliseconds) / of(theirs.milliseconds)).toFixed(2));
    console.log(`ratio to numpy, ${name}: ${ratios[0]} of the medians, ${ratios[1]} of the least`);
  }
}
