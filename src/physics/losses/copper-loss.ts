import { InvalidQuantity, within } from '../invalid-quantity.ts';
import type { Method } from '../method.ts';
import { alternatingResistanceRatio } from './alternating-resistance.ts';
import { conductorResistivity_ohm_m, type Winding, windingResistance } from './winding-resistance.ts';

export interface Harmonic {
  readonly frequency_Hz: number;
  readonly rms_A: number;
}

export interface WindingCurrent {
  readonly direct_A: number;
  readonly harmonics?: readonly Harmonic[];
}

export interface HarmonicLoss {
  readonly frequency_Hz: number;
  /** R_ac/R_dc at this frequency. */
  readonly resistanceRatio: number;
  readonly power_W: number;
}

export interface CopperLoss {
  readonly directResistance_ohm: number;
  readonly harmonics: readonly HarmonicLoss[];
  readonly copper_W: number;
  /** `relativeError` is that of `copper_W`: each part's own, weighted by its power. */
  readonly method: Method;
}

/**
 * Loss in a winding at one temperature: R_dc·(I_direct² + Σ F_R(f)·I_rms²), harmonics of different frequency being orthogonal.
 *
 * Throws `InvalidQuantity` at `/temperature_degC` and `/winding/…` as `windingResistance` and `alternatingResistanceRatio`;
 * at `/current/harmonics/i/frequency_Hz` where a frequency comes twice (their phases would decide the loss) or its ratio is
 * no number; at `/current/direct_A` or `/current/harmonics/i/rms_A` where the power is not finite.
 */
export function copperLoss(winding: Winding, current: WindingCurrent, temperature_degC: number): CopperLoss {
  // Outside `within`: the temperature lies beside the winding.
  conductorResistivity_ohm_m(winding.conductor ?? 'copper', temperature_degC);
  const direct = within('/winding', () => windingResistance(winding, temperature_degC));
  const direct_W = power(current.direct_A, direct.resistance_ohm, '/current/direct_A');

  const seen = new Set<number>();
  const names = new Set<string>([direct.method.name]);
  const references = new Set<string>(direct.method.references);
  const validity = new Set<string>([direct.method.validity]);
  let copper_W = direct_W;
  let added_W = 0;
  let largestAdded = 0;
  const harmonics = (current.harmonics ?? []).map(({ frequency_Hz, rms_A }, i): HarmonicLoss => {
    const pointer = `/current/harmonics/${i}`;
    if (seen.has(frequency_Hz)) {
      throw new InvalidQuantity(
        `${pointer}/frequency_Hz`,
        `${frequency_Hz} Hz is given twice; add the two by their phases first`,
      );
    }
    seen.add(frequency_Hz);
    const { resistanceRatio, method } = ratioAt(winding, frequency_Hz, temperature_degC, `${pointer}/frequency_Hz`);
    const power_W = power(rms_A, direct.resistance_ohm * resistanceRatio, `${pointer}/rms_A`);
    copper_W += power_W;
    added_W += power_W * method.relativeError;
    largestAdded = Math.max(largestAdded, method.relativeError);
    names.add(method.name);
    for (const reference of method.references) references.add(reference);
    validity.add(method.validity);
    return { frequency_Hz, resistanceRatio, power_W };
  });
  if (!Number.isFinite(copper_W)) throw new InvalidQuantity('/current', 'the copper loss is not a finite number');

  return {
    directResistance_ohm: direct.resistance_ohm,
    harmonics,
    copper_W,
    method: {
      name: [...names].join('; '),
      references: [...references],
      relativeError: direct.method.relativeError + (copper_W > 0 ? added_W / copper_W : largestAdded),
      validity: [...validity].join('; '),
    },
  };
}

function ratioAt(winding: Winding, frequency_Hz: number, temperature_degC: number, pointer: string) {
  const result = within('/winding', () => alternatingResistanceRatio(winding, frequency_Hz, temperature_degC));
  if (Number.isFinite(result.resistanceRatio)) return result;
  throw new InvalidQuantity(pointer, 'at this frequency the resistance is not a finite number');
}

function power(current_A: number, resistance_ohm: number, pointer: string): number {
  const power_W = current_A * current_A * resistance_ohm;
  if (!Number.isFinite(power_W)) throw new InvalidQuantity(pointer, 'the power of this current is not a finite number');
  return power_W;
}
