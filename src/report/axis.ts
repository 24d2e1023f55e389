/** Axes that are the same for every figure: round ticks, one SI prefix for the whole range, labels no longer than needed. */
import { inWords } from '../evidence/wording.ts';
import { widthOf, withMinus } from './text.ts';

export const TICK_SIZE = 12;

/** Narrower than this, relative to its largest value, a range is drawn wider: below, labels would show rounding. */
const NARROWEST_RANGE = 1e-9;

export interface Axis {
  readonly title: string;
  /** from the axis' start to its end, equally far apart */
  readonly tickLabels: readonly string[];
  /** where a value in SI is, in ticks from the axis' start */
  position(value: number): number;
  /** a value in SI with the axis' prefix, to six significant digits, or to a hundredth of `spread` */
  words(value: number, spread?: number): string;
}

export interface AxisAsked {
  readonly label: string;
  /** SI unit without prefix; '1' for counts */
  readonly unit: string;
  readonly fromZero?: boolean;
  readonly integers?: boolean;
  /** pixels for tick labels side by side; absent: the labels stand above each other */
  readonly room?: number;
}

/** An axis over all finite values among `values`, of which there must be one at least. */
export function axisOver(values: readonly number[], { label, unit, fromZero, integers, room }: AxisAsked): Axis {
  const finite = values.filter(Number.isFinite);
  let low = finite.reduce((least, value) => Math.min(least, value), fromZero ? 0 : Infinity);
  let high = finite.reduce((most, value) => Math.max(most, value), fromZero ? 0 : -Infinity);
  const magnitude = Math.max(Math.abs(low), Math.abs(high));
  if (!(high - low > NARROWEST_RANGE * magnitude)) {
    const margin = magnitude === 0 ? 1 : magnitude * (fromZero ? 1 : 0.01);
    if (!(fromZero && high === 0)) low -= fromZero ? 0 : margin;
    high += margin;
  }
  const { scale, prefixed } = prefixFor(Math.max(Math.abs(low), Math.abs(high)), unit);
  let ticks = roundTicks(low / scale, high / scale, 7, integers === true);
  for (let most = 6; room !== undefined && most >= 2 && !fits(ticks.labels, room); most--) {
    ticks = roundTicks(low / scale, high / scale, most, integers === true);
  }
  const { first, step, labels } = ticks;
  const digits = (value: number, spread?: number) =>
    spread !== undefined && spread > 0
      ? (value / scale).toFixed(decimalsOf(spread / scale / 100))
      : String(Number((value / scale).toPrecision(6)));
  return {
    title: prefixed === '' ? label : `${label} [${prefixed}]`,
    tickLabels: labels,
    // The difference first: near 1e6 ± 1e-3 quotients by the step would have lost the digits that are drawn.
    position: (value) => (value / scale - first * step) / step,
    words: (value, spread) => withMinus(`${digits(value, spread)} ${prefixed}`.trim()),
  };
}

/** The prefix that sentences would write for this magnitude, so that a figure and its text agree. */
function prefixFor(magnitude: number, unit: string): { scale: number; prefixed: string } {
  const [number = '', prefixed = ''] = inWords(magnitude, unit).split(' ');
  // inWords rounds to four digits: the quotient is a power of a thousand but for that.
  const thousands = Math.round(Math.log10(magnitude / Number(number)) / 3);
  return { scale: Number(`1e${thousands * 3}`), prefixed };
}

function roundTicks(low: number, high: number, most: number, integers: boolean) {
  let step = roundStep((high - low) / most);
  if (integers) step = Math.max(1, step);
  // A hundred-thousandth of a tick can't be seen, and is above the rounding of the narrowest range's quotients.
  const slack = 1e-5;
  const first = Math.floor(low / step + slack);
  const last = Math.max(first + 1, Math.ceil(high / step - slack));
  const largest = Math.max(Math.abs(first), Math.abs(last)) * step;
  const decimals = decimalsOf(step);
  const labels = Array.from({ length: last - first + 1 }, (_, i) => {
    const value = (first + i) * step;
    if (first + i === 0) return '0';
    const isUnwieldy = largest >= 1e6 || decimals > 12;
    return withMinus(isUnwieldy && step / largest > 1e-5 ? shortPower(value, step) : value.toFixed(decimals));
  });
  return { first, step, labels };
}

/** The least of 1, 2, 5 times a power of ten that is not below `least`. */
function roundStep(least: number): number {
  const exponent = Math.floor(Math.log10(least));
  const factor = least / 10 ** exponent;
  return Number(`${[1, 2, 5, 10].find((candidate) => candidate >= factor * (1 - 1e-9)) ?? 10}e${exponent}`);
}

/** Decimals that show a step of one digit. */
const decimalsOf = (step: number): number => Math.min(15, Math.max(0, -Math.floor(Math.log10(step) + 1e-9)));

const shortPower = (value: number, step: number): string =>
  value.toExponential(Math.max(0, Math.floor(Math.log10(Math.abs(value))) - Math.floor(Math.log10(step) + 1e-9)));

const fits = (labels: readonly string[], room: number): boolean =>
  labels.reduce((sum, text) => sum + widthOf(text, TICK_SIZE) + 12, 0) <= room;
