import { bindInputs } from '../metrology/record-inputs.ts';
import { InvalidQuantity } from '../physics/invalid-quantity.ts';
import type { ApprovalRequest } from './request.ts';

/** The smallest change of one input that makes a check pass; where none does, `to` is null and `reason` says why. */
export interface Relief {
  readonly pointer: string;
  readonly from: number;
  readonly to: number | null;
  readonly reason?: string;
}

/** An input is tried between a thousandth and a thousand times its value: beyond that it would be another part. */
const LARGEST_FACTOR = 1e3;
/** Relative change of the first trial; each next one doubles it. */
const FIRST_CHANGE = 1e-3;
/** The border between passing and not is found to this share of the change: 2⁻²⁰. */
const HALVINGS = 20;

/**
 * For each input that bears on a check, the smallest change that makes it pass, the other inputs held. Trials move away from the
 * present value in both directions, each twice as far as the last, until one passes; the border before it is then halved in.
 * Whether a trial passes is asked of the whole judgement, uncertainty included, so what is returned is known to pass; a model
 * that refuses a trial's dimensions counts as not passing.
 */
export function reliefOf(
  levers: readonly string[],
  request: ApprovalRequest,
  passes: (changed: ApprovalRequest) => boolean,
): Relief[] {
  return levers.flatMap((pointer) => {
    const lever = leverAt(request, pointer);
    if (lever === undefined) return [];
    return [smallestChange(pointer, lever.from, (value) => quietly(() => passes(lever.changedTo(value))) ?? false)];
  });
}

/** The input at `pointer` and the request with another value there; undefined where the request does not give it, or gives zero. */
function leverAt(request: ApprovalRequest, pointer: string) {
  const bound = quietly(() => bindInputs(request, { [pointer]: 0 }));
  const from = bound?.inputs[0]?.value;
  if (bound === undefined || from === undefined || from === 0) return undefined;
  const changedTo = (value: number) => {
    bound.set([value]);
    return bound.record;
  };
  return { from, changedTo };
}

/** What `work` returns; undefined where a quantity in it cannot be. */
function quietly<T>(work: () => T): T | undefined {
  try {
    return work();
  } catch (error) {
    if (error instanceof InvalidQuantity) return undefined;
    throw error;
  }
}

function smallestChange(pointer: string, from: number, passes: (value: number) => boolean): Relief {
  const whole = pointer.endsWith('/turns') && Number.isInteger(from);
  // In the logarithm of the ratio, so that halving and doubling are equally far.
  for (let reach = FIRST_CHANGE; reach < 2 * Math.log(LARGEST_FACTOR); reach *= 2) {
    const candidates = [reach, -reach]
      .map((change) => Math.max(-Math.log(LARGEST_FACTOR), Math.min(Math.log(LARGEST_FACTOR), change)))
      .filter((change) => passes(from * Math.exp(change)))
      .map((change) => border(change, reach === FIRST_CHANGE ? 0 : change / 2, (x) => passes(from * Math.exp(x))))
      .sort((a, b) => Math.abs(a) - Math.abs(b));
    const best = candidates.map((change) => presentable(from, change, whole, passes)).find((to) => to !== undefined);
    if (best !== undefined) return { pointer, from, to: best };
  }
  return {
    pointer,
    from,
    to: null,
    reason: `no value between ${from / LARGEST_FACTOR} and ${from * LARGEST_FACTOR} makes the check pass while the other inputs stay`,
  };
}

/** The change of smallest magnitude that still passes, between one that does not (or no change) and one that does. */
function border(passing: number, failing: number, passes: (change: number) => boolean): number {
  let [good, bad] = [passing, failing];
  for (let step = 0; step < HALVINGS; step++) {
    const middle = (good + bad) / 2;
    if (passes(middle)) good = middle;
    else bad = middle;
  }
  return good;
}

/** The changed value with six significant digits, or as a whole number of turns, rounded away from the present value. */
function presentable(
  from: number,
  change: number,
  whole: boolean,
  passes: (value: number) => boolean,
): number | undefined {
  const exact = from * Math.exp(change);
  const unit = whole ? 1 : 10 ** (Math.floor(Math.log10(Math.abs(exact))) - 5);
  const away = Math.sign(exact - from);
  const rounded = Number(((away > 0 ? Math.ceil(exact / unit) : Math.floor(exact / unit)) * unit).toPrecision(12));
  return [rounded, ...(whole ? [] : [exact])].find((value) => value !== 0 && passes(value));
}
