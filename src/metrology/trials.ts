import { InvalidQuantity } from '../physics/invalid-quantity.ts';
import { fillNormals, type Stream, streamOf } from './random.ts';
import type { Input } from './record-inputs.ts';

/**
 * A model of the form that a loop of a million runs wants: reads its inputs from `draws`, the first of them at `first`,
 * and writes its outputs, allocating nothing.
 */
export type TrialModel = (draws: Float64Array, first: number, outputs: Float64Array) => void;

/** A part of the trials of one seed, with a random stream of its own. */
export interface Block {
  readonly seed: number;
  /** Number of the block: which stream of the seed it draws from. */
  readonly index: number;
  readonly size: number;
}

/** Trials of a block, the last one's excepted. */
export const BLOCK_SIZE = 16384;

/** Trials whose inputs are drawn together: few enough to stay in the nearest cache. */
const DRAWN_AT_ONCE = 256;

/** The blocks that `trials` come in. */
export function blocksOf(seed: number, trials: number): Block[] {
  return Array.from({ length: Math.ceil(trials / BLOCK_SIZE) }, (_, index) => ({
    seed,
    index,
    size: Math.min(BLOCK_SIZE, trials - index * BLOCK_SIZE),
  }));
}

/**
 * One block of trials, each input drawn from its normal distribution, of a model with `outputCount` outputs: all values
 * of the first output, then of the second, and so on. A trial with an input at or below its minimum, one that the model
 * refuses (`InvalidQuantity`), or one of whose outputs is not finite, leaves NaN in all its places. Throws
 * `InvalidQuantity` '' where so many trials fail that the whole is bound to be refused.
 */
export function runBlock(
  model: TrialModel,
  inputs: readonly Input[],
  outputCount: number,
  { seed, index, size }: Block,
): Float64Array {
  const stream = streamOf(seed, index);
  const draws = new Float64Array(DRAWN_AT_ONCE * inputs.length);
  const outside = new Uint8Array(DRAWN_AT_ONCE);
  const samples = new Float64Array(size * outputCount);
  let failures = 0;
  for (let from = 0; from < size; from += DRAWN_AT_ONCE) {
    drawInputs(stream, inputs, draws, outside);
    const to = Math.min(from + DRAWN_AT_ONCE, size);
    const { failed, reason } = runTrials(model, draws, outside, samples.subarray(from), to - from, {
      outputCount,
      size,
    });
    failures += failed;
    // A tenth of any block is far beyond what chance makes of a tolerable part; exceptions are slow, so stop here.
    if (failures > size / 10 + 10) throw tooManyFailures(failures, to, reason);
  }
  return samples;
}

/**
 * Inputs of as many trials as `draws` holds, trial by trial; `outside` tells which trials have one at or below its
 * minimum.
 */
function drawInputs(stream: Stream, inputs: readonly Input[], draws: Float64Array, outside: Uint8Array): void {
  fillNormals(stream, draws);
  outside.fill(0);
  inputs.forEach(({ value, standardUncertainty, exclusiveMinimum = Number.NEGATIVE_INFINITY }, input) => {
    for (let trial = 0, i = input; trial < outside.length; trial++, i += inputs.length) {
      const drawn = value + standardUncertainty * draws[i]!;
      draws[i] = drawn;
      if (drawn <= exclusiveMinimum) outside[trial] = 1;
    }
  });
}

/** Runs `count` trials; output k of trial t goes to `samples` at k·size + t. */
function runTrials(
  model: TrialModel,
  draws: Float64Array,
  outside: Uint8Array,
  samples: Float64Array,
  count: number,
  { outputCount, size }: { readonly outputCount: number; readonly size: number },
): { failed: number; reason: string } {
  const inputCount = draws.length / outside.length;
  const outputs = new Float64Array(outputCount);
  let failed = 0;
  let reason = '';
  for (let trial = 0; trial < count; trial++) {
    let succeeds = outside[trial] === 0;
    try {
      if (succeeds) model(draws, trial * inputCount, outputs);
    } catch (error) {
      if (!(error instanceof InvalidQuantity)) throw error;
      reason = error.message;
      succeeds = false;
    }
    for (let k = 0; k < outputCount; k++) {
      const value = outputs[k]!;
      samples[k * size + trial] = value;
      // Infinity − Infinity and NaN − NaN are NaN.
      if (value - value !== 0) succeeds = false;
    }
    if (succeeds) continue;
    failed++;
    for (let k = 0; k < outputCount; k++) samples[k * size + trial] = Number.NaN;
  }
  return { failed, reason };
}

export function tooManyFailures(failures: number, trials: number, reason = ''): InvalidQuantity {
  const last = reason && ` (the last: ${reason})`;
  return new InvalidQuantity(
    '',
    `so large that the inputs leave the model's domain: ${failures} of ${trials} trials had no result${last}`,
  );
}
