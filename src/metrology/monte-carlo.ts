/**
 * Propagation of distributions by a Monte Carlo method, JCGM 101:2008, with independent normal inputs, over JSON
 * records.
 *
 * Trials come in blocks of a fixed size, each with a random stream of its own, so that a seed gives the same trials to
 * the last bit whatever runs the blocks, in whatever order: `recordModel` and `runBlock` in any thread, then `resultOf`
 * over the blocks in order.
 */
import { InvalidQuantity, within } from '../physics/invalid-quantity.ts';
import { bindInputs, type ExclusiveMinimum, type Input, type Setter } from './record-inputs.ts';
import { type Distribution, summarise } from './summary.ts';
import { blocksOf, runBlock, type TrialModel } from './trials.ts';

export interface MonteCarloOptions {
  /** Number of trials, at least 10/(1 − coverage). */
  readonly trials: number;
  /** Any non-negative safe integer; the same one gives the same answer. */
  readonly seed: number;
  readonly coverage?: number | undefined;
}

export interface MonteCarloResult {
  readonly trials: number;
  readonly seed: number;
  readonly coverage: number;
  readonly failedTrials: number;
  readonly outputs: Readonly<Record<string, Distribution>>;
}

/**
 * From a record to an answer among whose fields are the outputs. It is handed the same record again and again, and must
 * keep nothing of it.
 */
export type Evaluate<R> = (record: R) => object;

type Answer = Readonly<Record<string, unknown>>;

/**
 * Distribution of every output that `evaluate` computes from a JSON record some of whose numbers are uncertain:
 * `uncertainty` maps RFC 6901 pointers into `record` to standard uncertainties. Runs all trials in this thread;
 * `recordModel`, `runBlock` and `resultOf` are its parts for several.
 *
 * Throws `InvalidQuantity`: '/uncertainty/<escaped pointer>' where a pointer does not lead to a number or its
 * uncertainty is negative; '/uncertainty' where more than 0.1 % of the trials leave the model's domain; '/trials',
 * '/seed', '/coverage'; and whatever `evaluate` throws at the record as given.
 */
export function monteCarloOverRecord<R extends object>(
  record: R,
  uncertainty: Readonly<Record<string, number>>,
  evaluate: Evaluate<R>,
  { exclusiveMinimum, ...options }: MonteCarloOptions & { readonly exclusiveMinimum?: ExclusiveMinimum | undefined },
): MonteCarloResult {
  requireUsable(options);
  const { model, inputs, outputNames } = recordModel(record, uncertainty, evaluate, exclusiveMinimum);
  const blocks = blocksOf(options.seed, options.trials);
  return within('/uncertainty', () =>
    resultOf(
      outputNames,
      blocks.map((block) => runBlock(model, inputs, outputNames.length, block)),
      options,
    ),
  );
}

/** Throws `InvalidQuantity` '/trials', '/seed' or '/coverage' for what cannot be run. */
export function requireUsable({ trials, seed, coverage = 0.95 }: MonteCarloOptions): void {
  if (!(coverage > 0 && coverage < 1)) throw new InvalidQuantity('/coverage', 'must lie between 0 and 1');
  if (!Number.isSafeInteger(seed) || seed < 0) throw new InvalidQuantity('/seed', 'must be a non-negative integer');
  if (!Number.isSafeInteger(trials) || !(trials * (1 - coverage) >= 10)) {
    throw new InvalidQuantity(
      '/trials',
      `must be an integer, at least 10/(1 − coverage) = ${Math.ceil(10 / (1 - coverage))}`,
    );
  }
}

export interface RecordModel {
  readonly model: TrialModel;
  readonly inputs: readonly Input[];
  readonly outputNames: readonly string[];
}

/**
 * A model over a record in the form that `runBlock` takes: the numbers are set in one copy of the record. Its outputs
 * are `chosenOutputs`, or else every number in the answer to the record as given; a trial whose answer lacks one of
 * them fails.
 */
export function recordModel<R extends object>(
  record: R,
  uncertainty: Readonly<Record<string, number>>,
  evaluate: Evaluate<R>,
  exclusiveMinimum?: ExclusiveMinimum,
  chosenOutputs?: readonly string[],
): RecordModel {
  const { record: copy, inputs, set } = within('/uncertainty', () => bindInputs(record, uncertainty, exclusiveMinimum));
  const estimate = evaluate(copy) as Answer;
  const outputNames = chosenOutputs ?? Object.keys(estimate).filter((name) => typeof estimate[name] === 'number');
  return {
    model: trialModel(copy, set, evaluate as (record: R) => Record<string, number>, outputNames),
    inputs,
    outputNames,
  };
}

function trialModel<R>(
  copy: R,
  set: Setter,
  evaluate: (record: R) => Readonly<Record<string, number>>,
  outputNames: readonly string[],
): TrialModel {
  const [only, ...others] = outputNames;
  if (only !== undefined && others.length === 0) {
    // Without a loop over names a compiler that inlines `evaluate` never makes its answer: nothing to collect.
    return (draws, first, outputs) => {
      set(draws, first);
      outputs[0] = evaluate(copy)[only] ?? Number.NaN;
    };
  }
  return (draws, first, outputs) => {
    set(draws, first);
    const answer = evaluate(copy);
    for (let k = 0; k < outputNames.length; k++) outputs[k] = answer[outputNames[k]!] ?? Number.NaN;
  };
}

/** What all blocks of samples, in their order, come to. */
export function resultOf(
  outputNames: readonly string[],
  blocks: readonly Float64Array[],
  { trials, seed, coverage = 0.95 }: MonteCarloOptions,
): MonteCarloResult {
  let failed = 0;
  const outputs = outputNames.map((name, k): [string, Distribution] => {
    const samples = blocks.map((block) => {
      const size = block.length / outputNames.length;
      return block.subarray(k * size, (k + 1) * size);
    });
    const { failedTrials, ...distribution } = summarise(samples, coverage);
    failed = failedTrials;
    return [name, distribution];
  });
  return { trials, seed, coverage, failedTrials: failed, outputs: Object.fromEntries(outputs) };
}
