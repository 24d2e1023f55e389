/** What is known of a normal population from independent values of it: the input of every statistic that supposes one. */
import { InvalidQuantity } from '../../physics/invalid-quantity.ts';
import { type Moments, standardDeviation } from './moments.ts';
import { isUnavailable, type Unavailable } from './unavailable.ts';

export interface NormalSample {
  /** number of values, at least 2 */
  readonly n: number;
  readonly mean: number;
  /** sample standard deviation, divisor n − 1; above 0 */
  readonly standardDeviation: number;
}

/** The sample that these moments are of. */
export function sampleOf(moments: Moments): NormalSample | Unavailable {
  const s = standardDeviation(moments);
  if (isUnavailable(s)) return s;
  if (s === 0) return { unavailable: `all ${moments.n} values are equal: they tell no spread` };
  return { n: moments.n, mean: moments.mean, standardDeviation: s };
}

/** Throws `InvalidQuantity` '/n' (not an integer of at least 2), '/mean' (not finite), '/standardDeviation' (not finite and positive). */
export function requireSample({ n, mean, standardDeviation: s }: NormalSample): void {
  requireSize(n);
  if (!Number.isFinite(mean)) throw new InvalidQuantity('/mean', 'must be a finite number');
  if (!(s > 0 && s < Number.POSITIVE_INFINITY)) {
    throw new InvalidQuantity('/standardDeviation', 'must be a finite number above zero');
  }
}

export function requireSize(n: number): void {
  if (!(Number.isInteger(n) && n >= 2)) throw new InvalidQuantity('/n', 'must be an integer of at least 2');
}

/** Throws `InvalidQuantity` at `pointer` for a level that leaves no probability on one of its sides. */
export function requireLevel(pointer: string, level: number): void {
  if (!(level > 0 && level < 1)) throw new InvalidQuantity(pointer, 'must lie between 0 and 1, both excluded');
}
