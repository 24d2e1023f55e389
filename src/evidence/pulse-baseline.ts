/**
 * What a channel reads where nothing happens: its noise, its digitising step, and the quiet part of a pulse.
 */

/** A channel's noise as far as the samples show it. */
export interface ChannelNoise {
  /** standard deviation of a sample, the digitising step's part included */
  readonly deviation: number;
  /** digitising step; 0 where none shows */
  readonly step: number;
  /** standard uncertainty that averaging does not take away: of a mean that noise too small to cross steps leaves between two of them */
  readonly bias: number;
}

/**
 * The mean of the smallest four fifths of |x|, in standard deviations of a normal x: 2.5·(φ(0) − φ(z)) with z its 90 % quantile. It is
 * as indifferent to a few edges as the median and, unlike that, not confined to the digitising grid.
 */
const KEPT = 0.8;
const KEPT_MEAN_OF_NORMAL = 0.5586;
/** Up to so many samples' second differences are looked at: enough for 2 % of their spread. */
const LOOKED_AT = 4096;

/**
 * Noise of a channel from the smaller second differences of its samples, which neither a slope nor a few edges change, and its digitising step.
 */
export function noiseOf(time: Float64Array, values: Float64Array): ChannelNoise {
  const step = digitisingStep(values);
  const stride = Math.max(1, Math.floor((values.length - 2) / LOOKED_AT));
  const differences: number[] = [];
  for (let k = 1; k + 1 < values.length; k += stride) {
    const a = (time[k + 1]! - time[k]!) / (time[k + 1]! - time[k - 1]!);
    const difference = values[k]! - a * values[k - 1]! - (1 - a) * values[k + 1]!;
    differences.push(Math.abs(difference) / Math.sqrt(1 + a * a + (1 - a) ** 2));
  }
  differences.sort((x, y) => x - y);
  const kept = differences.slice(0, Math.max(1, Math.round(KEPT * differences.length)));
  const spread = kept.reduce((sum, difference) => sum + difference, 0) / kept.length / KEPT_MEAN_OF_NORMAL;
  return {
    deviation: Math.max(spread, step / Math.sqrt(12)),
    step,
    bias: quantisationBias(step, Math.sqrt(Math.max(spread ** 2 - step ** 2 / 12, 0))),
  };
}

/**
 * Root mean square over where the true value lies of the mean error of quantised samples with normal noise before the quantiser: the
 * first term of its Fourier series, and at most step/√12 (B. Widrow, I. Kollár, Quantization Noise, 2008, from memory).
 */
function quantisationBias(step: number, noise: number): number {
  if (step === 0) return 0;
  const first = (step / (Math.PI * Math.SQRT2)) * Math.exp(-2 * (Math.PI * (noise / step)) ** 2);
  return Math.min(first, step / Math.sqrt(12));
}

/** Values that are this close are the same, in parts of the largest. */
const ROUNDING = 1e-9;
/** Differences of up to so many steps are looked at, and must be whole within this part of a step: rounded text leaves a little. */
const FEW_STEPS = 10;
const OFF_GRID = 0.1;
/** So many of them are needed to tell a grid from chance, which is on it with probability 2·OFF_GRID each. */
const NEIGHBOURS = 8;

/** The step of which the smallest differences between the values that occur are multiples; 0 where they are not. */
function digitisingStep(values: Float64Array): number {
  const same = ROUNDING * largestOf(values);
  const stride = Math.max(1, Math.floor(values.length / LOOKED_AT));
  const sorted = values.filter((_, k) => k % stride === 0).sort();
  const differences: number[] = [];
  for (let k = 1; k < sorted.length; k++) {
    const difference = sorted[k]! - sorted[k - 1]!;
    if (difference > same) differences.push(difference);
  }
  const least = differences.reduce((a, b) => Math.min(a, b), Number.POSITIVE_INFINITY);
  const few = differences.filter((difference) => difference < (FEW_STEPS + 0.5) * least);
  const steps = few.reduce((sum, difference) => sum + Math.round(difference / least), 0);
  const step = few.reduce((sum, difference) => sum + difference, 0) / steps;
  const onGrid = few.every((difference) => Math.abs(difference / step - Math.round(difference / step)) < OFF_GRID);
  return few.length >= NEIGHBOURS && onGrid ? step : 0;
}

/** Samples at one end of a pulse where voltage and current stand still at what they read at zero. */
export interface QuietPart {
  readonly count: number;
  readonly voltage: number;
  readonly current: number;
}

/** Fewest samples of a quiet part. */
const FEWEST_QUIET = 3;
/** Fewest in which a slope is looked for: of fewer, chance makes one. */
const FEWEST_SLOPING = 6;
/** A sample further from the mean so far, in standard deviations, is no longer quiet. */
const OUTSIDE = 6;
/** A slope of more standard errors than this is one. */
const SLOPING = 4;
/** A level above this part of the pulse's largest is not an offset but the pulse. */
const LARGEST_OFFSET = 0.1;

/**
 * The quiet part at a pulse's start, or with `fromEnd` at its end; null where there is none. It ends where voltage or current
 * leaves its noise (the voltage does so at once, the current may take long to show), and is shortened until neither slopes. A level
 * above a tenth of the largest voltage or current is not taken for an offset.
 */
export function quietPart(
  voltage: Float64Array,
  current: Float64Array,
  noise: { readonly voltage: ChannelNoise; readonly current: ChannelNoise },
  fromEnd = false,
): QuietPart | null {
  const length = voltage.length;
  const at = (k: number) => (fromEnd ? length - 1 - k : k);
  const largest = { voltage: largestOf(voltage), current: largestOf(current) };
  const band = {
    voltage: OUTSIDE * noise.voltage.deviation + ROUNDING * largest.voltage,
    current: OUTSIDE * noise.current.deviation + ROUNDING * largest.current,
  };
  let count = 0;
  for (let [v, i] = [0, 0]; count < length; count++) {
    const [nextV, nextI] = [voltage[at(count)]!, current[at(count)]!];
    if (count > 0 && (Math.abs(nextV - v) > band.voltage || Math.abs(nextI - i) > band.current)) break;
    v += (nextV - v) / (count + 1);
    i += (nextI - i) / (count + 1);
  }
  const sloping = (values: Float64Array, rounding: number) => slopes(count, (k) => values[at(k)]!, rounding);
  while (
    count >= FEWEST_SLOPING &&
    (sloping(voltage, ROUNDING * largest.voltage) || sloping(current, ROUNDING * largest.current))
  ) {
    count = Math.floor(0.7 * count);
  }
  if (count < FEWEST_QUIET) return null;
  const mean = (values: Float64Array) => {
    let sum = 0;
    for (let k = 0; k < count; k++) sum += values[at(k)]!;
    return sum / count;
  };
  const part = { count, voltage: mean(voltage), current: mean(current) };
  const isOffset =
    Math.abs(part.voltage) <= LARGEST_OFFSET * largest.voltage &&
    Math.abs(part.current) <= LARGEST_OFFSET * largest.current;
  return isOffset ? part : null;
}

/** Largest magnitude. */
export function largestOf(values: Float64Array): number {
  let largest = 0;
  for (let k = 0; k < values.length; k++) largest = Math.max(largest, Math.abs(values[k]!));
  return largest;
}

/** Whether the first `count` values slope by more than chance; a change within `rounding` is none. */
function slopes(count: number, value: (k: number) => number, rounding: number): boolean {
  const middle = (count - 1) / 2;
  let mean = 0;
  for (let k = 0; k < count; k++) mean += value(k) / count;
  let moment = 0;
  let squares = 0;
  for (let k = 0; k < count; k++) {
    const difference = value(k) - mean;
    moment += (k - middle) * difference;
    squares += difference * difference;
  }
  const spread = (count * (count * count - 1)) / 12; // Σ (k − middle)²
  const slope = moment / spread;
  if (Math.abs(slope) * count <= rounding) return false;
  const scatter = Math.max(squares - slope * moment, 0) / (count - 2);
  return Math.abs(slope) > SLOPING * Math.sqrt(scatter / spread);
}
