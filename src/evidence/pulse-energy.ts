import { type ChannelNoise, largestOf } from './pulse-baseline.ts';
import { integral, isEdge } from './pulse-flux.ts';
import type { Samples } from './pulse-record.ts';

/**
 * Where a pulse's energy went, over the whole record unless said otherwise; voltage and current without their offsets.
 *
 * What came in and is not accounted for is `residual_J` = delivered − recovered − dissipated − remaining: the core's loss, ∮ i dλ of
 * the loop, and the error of the balance, whose standard uncertainty comes with it.
 */
export interface EnergyAudit {
  /** ∫ v·i dt while v·i > 0: into the terminals */
  readonly delivered_J: number;
  /** ∫ R·i² dt: into the winding's resistance */
  readonly dissipated_J: number;
  /** ∫ i dλ along the flux characteristic from zero to the peak current: what the inductor held there */
  readonly stored_J: number;
  /** −∫ v·i dt while v·i < 0: back out of the terminals */
  readonly recovered_J: number;
  /** ∫ i dλ along the flux characteristic from zero to the last sample's current: what it still holds */
  readonly remaining_J: number;
  readonly residual_J: number;
  /** of `residual_J`, from noise, voltage offset, and not knowing when between two samples the voltage switched */
  readonly residualUncertainty_J: number;
}

/**
 * The audit of samples whose voltage and current are given without their offsets. Each of v·i's signs is integrated on its own by trapezia,
 * which puts a switching of the voltage half way between its two samples.
 */
export function auditEnergy(
  { time, resistance_ohm }: Samples,
  voltage: Float64Array,
  current: Float64Array,
  noise: { readonly voltage: ChannelNoise; readonly current: ChannelNoise },
  offsetUncertainty_V: number,
  held: { readonly stored_J: number; readonly remaining_J: number },
): EnergyAudit {
  const delivered_J = integral(time, (k) => Math.max(voltage[k]! * current[k]!, 0));
  const recovered_J = integral(time, (k) => Math.max(-voltage[k]! * current[k]!, 0));
  const dissipated_J = integral(time, (k) => resistance_ohm * current[k]! ** 2);
  const charge = integral(time, (k) => current[k]!);
  const largest = largestOf(voltage);
  let squares = (offsetUncertainty_V * charge) ** 2;
  for (let k = 1; k < time.length; k++) {
    const interval = time[k]! - time[k - 1]!;
    const [v, i] = [voltage[k]!, current[k]!];
    squares += interval ** 2 * ((noise.voltage.deviation * i) ** 2 + (noise.current.deviation * v) ** 2);
    if (isEdge(voltage, k, largest)) squares += (interval * (v * i - voltage[k - 1]! * current[k - 1]!)) ** 2 / 12;
  }
  return {
    delivered_J,
    dissipated_J,
    stored_J: held.stored_J,
    recovered_J,
    remaining_J: held.remaining_J,
    residual_J: delivered_J - recovered_J - dissipated_J - held.remaining_J,
    residualUncertainty_J: Math.sqrt(squares),
  };
}
