import { InvalidQuantity } from '../physics/invalid-quantity.ts';

/** One pulse as a rig samples it: equal arrays, times increasing but not necessarily evenly. */
export interface Pulse {
  readonly time_s: readonly number[];
  /** at the terminals, positive as it drives a positive current */
  readonly voltage_V: readonly number[];
  readonly current_A: readonly number[];
  /** of the winding while it was pulsed */
  readonly resistance_ohm: number;
  /** what the voltage reads at 0 V; `auto`, the default, finds it in the pulse itself */
  readonly voltageOffset_V?: number | 'auto';
}

/** The same as dense arrays, mirrored where the pulse is negative. */
export interface Samples {
  readonly time: Float64Array;
  readonly voltage: Float64Array;
  readonly current: Float64Array;
  readonly resistance_ohm: number;
  readonly mirrored: boolean;
}

/** Fewer cannot show a quiet part, a rise and how noisy they are. */
const FEWEST = 8;

/**
 * Checks a pulse and takes it into dense arrays. Throws `InvalidQuantity` at `/time_s…`, `/voltage_V…`, `/current_A…`,
 * `/resistance_ohm` or `/voltageOffset_V`: fewer than eight samples, unequal lengths, times that do not increase, numbers that
 * are not finite, a negative resistance.
 */
export function samplesOf({ time_s, voltage_V, current_A, resistance_ohm, voltageOffset_V }: Pulse): Samples {
  const count = time_s.length;
  if (count < FEWEST) throw new InvalidQuantity('/time_s', `a pulse has at least ${FEWEST} samples, not ${count}`);
  for (const [name, values] of [
    ['voltage_V', voltage_V],
    ['current_A', current_A],
  ] as const) {
    if (values.length !== count) {
      throw new InvalidQuantity(`/${name}`, `as many samples as times are needed: ${values.length} for ${count}`);
    }
  }
  const time = dense(time_s, '/time_s');
  for (let k = 1; k < count; k++) {
    if (!(time[k]! > time[k - 1]!)) {
      throw new InvalidQuantity(`/time_s/${k}`, `times increase, but ${time[k]} s follows ${time[k - 1]} s`);
    }
  }
  const voltage = dense(voltage_V, '/voltage_V');
  const current = dense(current_A, '/current_A');
  if (!(resistance_ohm >= 0 && Number.isFinite(resistance_ohm))) {
    throw new InvalidQuantity('/resistance_ohm', `a resistance is not negative, as ${resistance_ohm} Ω is`);
  }
  if (typeof voltageOffset_V === 'number' && !Number.isFinite(voltageOffset_V)) {
    throw new InvalidQuantity('/voltageOffset_V', `an offset is a number, not ${voltageOffset_V}`);
  }
  const mirrored = isNegative(current);
  if (mirrored) {
    for (let k = 0; k < count; k++) {
      voltage[k] = -voltage[k]!;
      current[k] = -current[k]!;
    }
  }
  return { time, voltage, current, resistance_ohm, mirrored };
}

function dense(values: readonly number[], pointer: string): Float64Array {
  const array = Float64Array.from(values);
  const bad = array.findIndex((value) => !Number.isFinite(value));
  if (bad >= 0) throw new InvalidQuantity(`${pointer}/${bad}`, `a sample is a number, not ${values[bad]}`);
  return array;
}

/** A pulse is negative where its largest excursion from where it starts is. */
function isNegative(current: Float64Array): boolean {
  let [least, most] = [current[0]!, current[0]!];
  for (const value of current) {
    if (value < least) least = value;
    if (value > most) most = value;
  }
  return current[0]! - least > most - current[0]!;
}
