import { InvalidQuantity } from '../physics/invalid-quantity.ts';
import { fillNormals, streamOf } from './random.ts';
import type { Input } from './record-inputs.ts';

/** A model of the form that a loop of a million runs wants: reads the inputs and writes the outputs, allocating nothing. */
export type TrialModel = (inputs: Float64Array, outputs: Float64Array) => void;

/** A part of the trials of one seed, with a random stream of its own. */
export interface Block {
  readonly seed: number;
  /** Number of the block: which stream of the seed it draws from. */
  readonly index: number;
  readonly size: number;
}

/** Trials of a block, the last one's excepted. */
export const BLOCK_SIZE = 16384;

/** Trials whose normal numbers are drawn together: few enough to stay in the nearest cache. */
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
 * One block of trials, each input drawn from its normal distribution, of a model with `outputCount` outputs: all values of the
 * first output, then of the second, and so on. A trial with an input at or below its minimum, one that the model refuses
 * (`InvalidQuantity`), or one of whose outputs is not finite, leaves NaN in all its places.
 * Throws `InvalidQuantity` '' where so many trials fail that the whole is bound to be refused.
 */
export function runBlock(
  model: TrialModel,
  inputs: readonly Input[],
  outputCount: number,
  { seed, index, size }: Block,
): Float64Array {
  const inputCount = inputs.length;
  const values = Float64Array.from(inputs, ({ value }) => value);
  const uncertainties = Float64Array.from(inputs, ({ standardUncertainty }) => standardUncertainty);
  const minima = Float64Array.from(inputs, ({ exclusiveMinimum = Number.NEGATIVE_INFINITY }) => exclusiveMinimum);
  const stream = streamOf(seed, index);
  const normals = new Float64Array(inputCount * DRAWN_AT_ONCE);
  const drawn = new Float64Array(inputCount);
  const outputs = new Float64Array(outputCount);
  const samples = new Float64Array(size * outputCount);
  let failures = 0;
  let reason = '';
  for (let trial = 0, next = 0; trial < size; trial++) {
    if (trial % DRAWN_AT_ONCE === 0) {
      fillNormals(stream, normals);
      next = 0;
    }
    let succeeds = true;
    for (let i = 0; i < inputCount; i++) {
      const value = values[i]! + uncertainties[i]! * normals[next++]!;
      drawn[i] = value;
      if (!(value > minima[i]!)) succeeds = false;
    }
    if (succeeds) {
      try {
        model(drawn, outputs);
      } catch (error) {
        if (!(error instanceof InvalidQuantity)) throw error;
        reason = error.message;
        succeeds = false;
      }
    }
    for (let k = 0; k < outputCount; k++) {
      const value = outputs[k]!;
      samples[k * size + trial] = value;
      // Infinity − Infinity and NaN − NaN are NaN.
      if (value - value !== 0) succeeds = false;
    }
    if (succeeds) continue;
    for (let k = 0; k < outputCount; k++) samples[k * size + trial] = Number.NaN;
    // A tenth of any block is far beyond what chance makes of a tolerable part; exceptions are slow, so stop here.
    if (++failures > size / 10 + 10) throw tooManyFailures(failures, trial + 1, reason);
  }
  return samples;
}

export function tooManyFailures(failures: number, trials: number, reason = ''): InvalidQuantity {
  const last = reason && ` (the last: ${reason})`;
  return new InvalidQuantity(
    '',
    `so large that the inputs leave the model's domain: ${failures} of ${trials} trials had no result${last}`,
  );
}
