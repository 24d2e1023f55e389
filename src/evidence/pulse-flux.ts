import { InvalidQuantity } from '../physics/invalid-quantity.ts';
import { type ChannelNoise, largestOf, type QuietPart } from './pulse-baseline.ts';
import type { Samples } from './pulse-record.ts';

/** Where the voltage's offset was taken from; `none`: the pulse shows none, and it was taken as zero. */
export type OffsetSource = 'given' | 'quiet part' | 'closed loop' | 'none';

export interface VoltageOffset {
  readonly value_V: number;
  readonly source: OffsetSource;
  /** standard uncertainty; 0 where it was given or taken as zero */
  readonly standardUncertainty_V: number;
}

/**
 * A change of voltage by this part of its largest from one sample to the next is an edge, which may lie anywhere between the two: the
 * trapezium's share of it is then uncertain by up to half of change × interval.
 */
const EDGE = 0.25;

export function isEdge(voltage: Float64Array, k: number, largest: number): boolean {
  return Math.abs(voltage[k]! - voltage[k - 1]!) > EDGE * largest;
}

/** The current has returned to zero within this part of its largest, or its noise if that is more. */
const RETURNED = 0.005;

/**
 * The voltage offset: as given; else the mean of a quiet part, at the start or else at the end; else what lets λ return to its start where the
 * current does (a remanence that changed is taken for an offset); else zero. `current` without its offset.
 */
export function voltageOffset(
  { time, voltage, resistance_ohm }: Samples,
  current: Float64Array,
  given: number | 'auto',
  quiet: QuietPart | null,
  noise: { readonly voltage: ChannelNoise; readonly current: ChannelNoise },
): VoltageOffset {
  if (given !== 'auto') return { value_V: given, source: 'given', standardUncertainty_V: 0 };
  if (quiet) {
    const standardUncertainty_V = Math.hypot(noise.voltage.deviation / Math.sqrt(quiet.count), noise.voltage.bias);
    return { value_V: quiet.voltage, source: 'quiet part', standardUncertainty_V };
  }
  const last = time.length - 1;
  const largest = largestOf(current);
  const returned = Math.max(RETURNED * largest, 4 * noise.current.deviation);
  if (!(Math.abs(current[last]! - current[0]!) <= returned)) {
    return { value_V: 0, source: 'none', standardUncertainty_V: 0 };
  }
  const duration = time[last]! - time[0]!;
  const value_V = integral(time, (k) => voltage[k]! - resistance_ohm * current[k]!) / duration;
  const timing = edgeUncertainty(time, voltage, 0, last) / duration;
  // What the current has not quite returned by is worth its part of λ, twice that for the inductance at zero current being larger.
  const reached = integral(time, (k) => Math.max(voltage[k]! - resistance_ohm * current[k]! - value_V, 0));
  const short = (2 * (Math.abs(current[last]! - current[0]!) / largest) * reached) / duration;
  const noisy = Math.hypot(noise.voltage.deviation / Math.sqrt(time.length), noise.voltage.bias);
  return { value_V, source: 'closed loop', standardUncertainty_V: Math.hypot(timing, noisy, short) };
}

/** Standard uncertainty of ∫v dt between two samples from not knowing when between its samples an edge came: rectangular, each on its own. */
function edgeUncertainty(time: Float64Array, voltage: Float64Array, from: number, to: number): number {
  const largest = largestOf(voltage);
  let squares = 0;
  for (let k = from + 1; k <= to; k++) {
    if (isEdge(voltage, k, largest)) squares += ((voltage[k]! - voltage[k - 1]!) * (time[k]! - time[k - 1]!)) ** 2 / 12;
  }
  return Math.sqrt(squares);
}

/**
 * ∫ y dt over all samples by trapezia, in a compensated sum (A. Neumaier, Z. angew. Math. Mech. 54 (1974) 39-51). Of all rules through
 * the samples trapezia weigh independent noise most evenly and are exact for a voltage that stands still; rules of higher order gain
 * nothing where the voltage has edges.
 */
export function integral(time: Float64Array, y: (k: number) => number): number {
  let [sum, correction] = [0, 0];
  let before = y(0);
  for (let k = 1; k < time.length; k++) {
    const value = y(k);
    const term = ((before + value) / 2) * (time[k]! - time[k - 1]!);
    const next = sum + term;
    correction += Math.abs(sum) >= Math.abs(term) ? sum - next + term : term - next + sum;
    sum = next;
    before = value;
  }
  return sum + correction;
}

/** λ at every sample, ∫(v − R·i) dt from the sample `origin` on (before it as well), by the same rule; both without their offsets. */
export function fluxLinkage(
  { time, resistance_ohm }: Samples,
  voltage: Float64Array,
  current: Float64Array,
  origin: number,
): Float64Array {
  const linkage = new Float64Array(time.length);
  let [sum, correction] = [0, 0];
  for (let k = 1; k < time.length; k++) {
    const driving = (voltage[k - 1]! + voltage[k]! - resistance_ohm * (current[k - 1]! + current[k]!)) / 2;
    const term = driving * (time[k]! - time[k - 1]!);
    const next = sum + term;
    correction += Math.abs(sum) >= Math.abs(term) ? sum - next + term : term - next + sum;
    sum = next;
    linkage[k] = sum + correction;
  }
  const atOrigin = linkage[origin]!;
  if (atOrigin !== 0) for (let k = 0; k < linkage.length; k++) linkage[k]! -= atOrigin;
  return linkage;
}

/**
 * How far the trapezia of λ over a branch may be off: their difference to those through every second sample, of which a third would be the
 * error of a smooth voltage.
 */
export function quadratureUncertainty(
  { time, resistance_ohm }: Samples,
  voltage: Float64Array,
  current: Float64Array,
  { from, to }: RisingBranch,
): number {
  const driving = (k: number) => voltage[k]! - resistance_ohm * current[k]!;
  const trapezium = (a: number, b: number) => ((driving(a) + driving(b)) / 2) * (time[b]! - time[a]!);
  let difference = 0;
  for (let k = from; k + 2 <= to; k += 2)
    difference += trapezium(k, k + 1) + trapezium(k + 1, k + 2) - trapezium(k, k + 2);
  return Math.abs(difference);
}

/** Samples over which the current rises from zero: `from` to `to`, inclusive, close enough together to show the curve, and `peak`. */
export interface RisingBranch {
  readonly from: number;
  readonly to: number;
  readonly peak: number;
}

/** Fewest samples of a rise that a curve can be put through. */
const FEWEST_RISING = 6;
/** A peak below this many standard deviations of the noise is noise. */
const SEEN = 12;
/** A pulse starts this near zero, in parts of its peak (or within its noise). */
const NEAR_ZERO = 0.05;

/**
 * The rising branch of a pulse that starts at the sample `onset`: to where λ, which is far less noisy than the current, is largest while the
 * current is near its peak. Samples next to an edge at either end are left out.
 *
 * Throws `InvalidQuantity` at `/current_A…`, `/voltage_V` or `/resistance_ohm` where the current does not rise or not from zero, the flux
 * linkage does not rise with it, or too few samples lie on the rise.
 */
export function risingBranch(
  samples: Samples,
  voltage: Float64Array,
  current: Float64Array,
  linkage: Float64Array,
  onset: number,
  noise: ChannelNoise,
): RisingBranch {
  const largest = largestCurrent(current);
  if (!(largest > SEEN * noise.deviation)) {
    throw new InvalidQuantity('/current_A', `the current never rises out of its noise, ${noise.deviation} A`);
  }
  let end = onset;
  while (end < current.length - 1 && current[end]! < 0.9 * largest) end++;
  while (end < current.length - 1 && current[end]! > largest / 2) end++;
  let peak = onset;
  for (let k = onset; k <= end; k++) if (linkage[k]! > linkage[peak]!) peak = k;
  if (!(current[peak]! > largest / 2 && linkage[peak]! > 0)) throw notRising(samples, voltage);
  const steepest = largestOf(voltage);
  const from = settledFrom(voltage, onset, steepest);
  while (peak > from && isEdge(voltage, peak, steepest)) peak--;
  const first = current[onset]!;
  if (Math.abs(first) > Math.max(NEAR_ZERO * largest, SEEN * noise.deviation)) {
    throw new InvalidQuantity(
      `/current_A/${onset}`,
      `a pulse starts at zero current; this one starts at ${((100 * first) / largest).toPrecision(3)} % of its peak`,
    );
  }
  if (peak - from + 1 < FEWEST_RISING || !(linkage[peak]! > 0)) {
    throw new InvalidQuantity(
      '/current_A',
      `only ${peak - from + 1} samples lie on the rise of the current; at least ${FEWEST_RISING} are needed`,
    );
  }
  return { from, to: denseUpTo(linkage, current, from, peak), peak };
}

/** Two samples further apart than this part of the curve's length, and than so many times the mean, do not show what is between them. */
const FAR = 0.1;
const FAR_IN_MEANS = 4;

/**
 * The last sample before the peak that is not far from the one before it. In deep saturation the current may come up within a few samples, which
 * say too little of how it did to be let near the knee.
 */
function denseUpTo(linkage: Float64Array, current: Float64Array, from: number, peak: number): number {
  const far = Math.max(FAR, FAR_IN_MEANS / (peak - from));
  let to = peak;
  while (to - from >= FEWEST_RISING) {
    const byLinkage = (linkage[to]! - linkage[to - 1]!) / linkage[peak]!;
    const byCurrent = (current[to]! - current[to - 1]!) / current[peak]!;
    if ((byLinkage + byCurrent) / 2 <= far) break;
    to--;
  }
  return to;
}

/** Intervals after the onset in which the voltage comes up, and a change in them that is counted as its coming. */
const ONSET_INTERVALS = 3;
const ONSET_CHANGE = 0.03;

/** The first sample after the voltage has come up: those before do not share one λ's zero with the rest. */
function settledFrom(voltage: Float64Array, onset: number, largest: number): number {
  let from = onset;
  for (let k = onset + 1; k <= onset + ONSET_INTERVALS; k++) {
    if (Math.abs(voltage[k]! - voltage[k - 1]!) > ONSET_CHANGE * largest) from = k;
  }
  return from;
}

/**
 * Standard uncertainty of λ at the first sample of a branch whose onset is known: each change of voltage since then came somewhere
 * within its interval.
 */
export function onsetUncertainty(time: Float64Array, voltage: Float64Array, onset: number): number {
  let squares = 0;
  for (let k = onset + 1; k <= onset + ONSET_INTERVALS; k++) {
    squares += ((voltage[k]! - voltage[k - 1]!) * (time[k]! - time[k - 1]!)) ** 2 / 12;
  }
  return Math.sqrt(squares);
}

function largestCurrent(current: Float64Array): number {
  let largest = Number.NEGATIVE_INFINITY;
  for (const value of current) largest = Math.max(largest, value);
  return largest;
}

function notRising({ time, resistance_ohm }: Samples, voltage: Float64Array): InvalidQuantity {
  const drives = integral(time, (k) => Math.max(voltage[k]!, 0)) > integral(time, (k) => Math.max(-voltage[k]!, 0));
  return drives && resistance_ohm > 0
    ? new InvalidQuantity(
        '/resistance_ohm',
        `the flux linkage does not rise with the current: ${resistance_ohm} Ω leaves nothing of the voltage`,
      )
    : new InvalidQuantity(
        '/voltage_V',
        'the flux linkage does not rise with the current: the polarity of one of the two is reversed, or the offset is wrong',
      );
}
