import type { Method } from '../physics/method.ts';

/** What a quantity must stay within; at least one side is given where it is judged. */
export interface Limit {
  readonly lower?: number;
  readonly upper?: number;
}

/**
 * One quantity beside its limit, before any decision. `standardUncertainty` is what the model or the instrument leaves; what the
 * request's own uncertainties add is propagated by whoever judges.
 */
export interface Observation {
  /** Starts a sentence: "Differential inductance at 12 A". */
  readonly what: string;
  readonly unit: string;
  readonly limit: Limit;
  readonly method: Method;
  /** Absent where it cannot be had; then `undecided` says why. */
  readonly value?: number;
  readonly standardUncertainty?: number;
  /** Why no decision may be taken from the numbers, however they lie. */
  readonly undecided?: string;
  /** Why a pass must stay open: the value could condemn the part, but not clear it. */
  readonly passIsUndecided?: string;
  /** The true value is at least `value`, so that it can pass a lower limit but not fail it. */
  readonly atLeast?: boolean;
  /** The limit is met whatever the numbers, and why. */
  readonly metBecause?: string;
  /** The limit is missed whatever the numbers, and why. */
  readonly missedBecause?: string;
  /** The measured unit that this is about. */
  readonly serial?: string;
}
