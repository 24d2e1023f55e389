/**
 * Propagation of uncertainty, first order: JCGM 100:2008 (GUM) 5.1.2, and 5.2.2 with correlated inputs.
 * Coverage beyond first order is what monte-carlo.ts is for.
 */
import { InvalidQuantity, within } from '../physics/invalid-quantity.ts';
import { requireCorrelationMatrix } from './correlation.ts';
import { type DifferenceScheme, derivatives } from './derivative.ts';
import { bindInputs, type ExclusiveMinimum, escapePointerToken, type Input } from './record-inputs.ts';

export interface Contribution {
  readonly name: string;
  /** Partial derivative of the output by this input; null where the input's uncertainty is 0 and nobody asks. */
  readonly sensitivity: number | null;
  /** |sensitivity| · standard uncertainty of the input, in the output's unit. */
  readonly standardUncertainty: number;
  /**
   * Part of the output's variance; all add up to 1, or are 0 where the output has none. Negative only by correlation.
   */
  readonly share: number;
  /**
   * The differences that the sensitivity was taken from: one-sided at a border of the model's domain. Null without one.
   */
  readonly difference: DifferenceScheme | null;
}

export interface Propagated {
  readonly value: number;
  readonly standardUncertainty: number;
  readonly contributions: readonly Contribution[];
}

export interface PropagationOptions {
  /** Correlation coefficients of the inputs, in their order; default: independent. */
  readonly correlation?: readonly (readonly number[])[] | undefined;
}

/** A model with one output, or several at once; it throws `InvalidQuantity` where the inputs leave its domain. */
export type ScalarModel = (inputs: readonly number[]) => number;
export type VectorModel = (inputs: readonly number[]) => readonly number[];

/**
 * Standard uncertainty of what `model` computes from `inputs`, and each input's part in it.
 *
 * Throws `InvalidQuantity`: '/<name>' (a JSON pointer token) for an input whose uncertainty is negative or not finite,
 * or that the model takes no step away from in either direction; '/correlation…' for an impossible matrix; and whatever
 * the model itself throws at the estimates.
 */
export function propagate(model: ScalarModel, inputs: readonly Input[], options?: PropagationOptions): Propagated;
export function propagate(model: VectorModel, inputs: readonly Input[], options?: PropagationOptions): Propagated[];
export function propagate(
  model: ScalarModel | VectorModel,
  inputs: readonly Input[],
  { correlation }: PropagationOptions = {},
): Propagated | Propagated[] {
  requireUsable(inputs);
  if (correlation) within('/correlation', () => requireCorrelationMatrix(correlation, inputs.length));
  const estimate = model(inputs.map(({ value }) => value));
  if (typeof estimate !== 'number') return firstOrder(model as VectorModel, estimate, inputs, correlation);
  return firstOrder((x) => [(model as ScalarModel)(x)], [estimate], inputs, correlation)[0]!;
}

/**
 * The same over a JSON record: `uncertainty` maps RFC 6901 pointers into `record` to standard uncertainties, `evaluate`
 * computes named outputs from it. The outputs are those of the record as given; a step at which one of them is missing
 * or not finite counts as outside the domain. `evaluate` is handed one and the same copy with numbers replaced, and
 * must keep nothing of it.
 *
 * Throws `InvalidQuantity` '/uncertainty/<escaped pointer>' where a pointer does not lead to a number, its uncertainty
 * is negative, or no step away from it can be taken; and whatever `evaluate` throws at the record as given.
 */
export function propagateOverRecord<R extends object>(
  record: R,
  uncertainty: Readonly<Record<string, number>>,
  evaluate: (record: R) => Readonly<Record<string, number>>,
  exclusiveMinimum?: ExclusiveMinimum,
): Record<string, Propagated> {
  const bound = within('/uncertainty', () => bindInputs(record, uncertainty, exclusiveMinimum));
  const estimate = evaluate(bound.record);
  const names = Object.keys(estimate);
  const model = (values: readonly number[]) => {
    bound.set(values);
    const outputs = evaluate(bound.record);
    return names.map((name) => outputs[name] ?? Number.NaN);
  };
  const propagated = within('/uncertainty', () => firstOrder(model, Object.values(estimate), bound.inputs));
  return Object.fromEntries(names.map((name, index) => [name, propagated[index]!]));
}

function requireUsable(inputs: readonly Input[]): void {
  for (const { name, value, standardUncertainty } of inputs) {
    const pointer = `/${escapePointerToken(name)}`;
    if (!Number.isFinite(value)) throw new InvalidQuantity(pointer, 'must be a finite number');
    if (!(standardUncertainty >= 0 && standardUncertainty < Number.POSITIVE_INFINITY)) {
      throw new InvalidQuantity(pointer, 'a standard uncertainty must be a finite number, zero or positive');
    }
  }
}

function firstOrder(
  model: VectorModel,
  estimate: readonly number[],
  inputs: readonly Input[],
  correlation?: readonly (readonly number[])[],
): Propagated[] {
  const slopes = inputs.map((_, index) => sensitivities(model, estimate, inputs, index));
  return estimate.map((value, output) => {
    const terms = inputs.map(({ standardUncertainty }, i) => (slopes[i]?.values[output] ?? 0) * standardUncertainty);
    const { standardUncertainty, shares } = combine(terms, correlation);
    const contributions = inputs.map(({ name }, i) => ({
      name,
      sensitivity: slopes[i]?.values[output] ?? null,
      standardUncertainty: Math.abs(terms[i]!),
      share: shares[i]!,
      difference: slopes[i]?.scheme ?? null,
    }));
    return { value, standardUncertainty, contributions };
  });
}

/** ∂output/∂input for every output; null for an input known exactly. */
function sensitivities(model: VectorModel, estimate: readonly number[], inputs: readonly Input[], index: number) {
  const { name, value, standardUncertainty, exclusiveMinimum = Number.NEGATIVE_INFINITY } = inputs[index]!;
  if (standardUncertainty === 0) return null;
  const point = inputs.map((input) => input.value);
  const along = (x: number) => {
    if (x <= exclusiveMinimum) return null;
    point[index] = x;
    try {
      const outputs = model(point);
      return outputs.every(Number.isFinite) ? outputs : null;
    } catch (error) {
      if (error instanceof InvalidQuantity) return null;
      throw error;
    }
  };
  // An eighth of the value is near the scale of most laws and stays on its side of zero. Where the uncertainty exceeds
  // the value, as at an offset of zero, it is the only scale known. Extrapolation finds what is smaller.
  const step = standardUncertainty > Math.abs(value) ? standardUncertainty : Math.abs(value) / 8;
  const found = derivatives(along, value, estimate, { step, scale: standardUncertainty });
  if (found) return found;
  throw new InvalidQuantity(
    `/${escapePointerToken(name)}`,
    `the model takes no value beside ${value}, so an uncertainty of it cannot be propagated`,
  );
}

/**
 * Square root of the quadratic form Σ Σ tᵢ rᵢⱼ tⱼ, and each row's part in it. Scaled, so that squares do not overflow.
 */
function combine(terms: readonly number[], correlation?: readonly (readonly number[])[]) {
  const scale = Math.max(0, ...terms.map(Math.abs));
  if (scale === 0) return { standardUncertainty: 0, shares: terms.map(() => 0) };
  const scaled = terms.map((term) => term / scale);
  const parts = scaled.map((term, i) =>
    correlation ? term * correlation[i]!.reduce((sum, r, j) => sum + r * scaled[j]!, 0) : term * term,
  );
  const variance = parts.reduce((sum, part) => sum + part, 0);
  // Fully correlated inputs may cancel; rounding must then not leave a negative variance.
  if (variance <= Number.EPSILON) return { standardUncertainty: 0, shares: terms.map(() => 0) };
  return { standardUncertainty: scale * Math.sqrt(variance), shares: parts.map((part) => part / variance) };
}
