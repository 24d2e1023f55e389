import { InvalidQuantity } from '../invalid-quantity.ts';
import type { Method } from '../method.ts';
import { findRoot } from '../numerics/roots.ts';
import { type CopperLoss, copperLoss, type WindingCurrent } from './copper-loss.ts';
import { conductorTemperatureRange, type Winding } from './winding-resistance.ts';

/** How the part gives off its heat: exactly one of the two. */
export interface Cooling {
  readonly thermalResistance_K_per_W?: number;
  readonly surfaceArea_m2?: number;
}

export interface HeatedPart {
  readonly winding: Winding;
  readonly current: WindingCurrent;
  /** Core loss and its method; taken as constant over temperature. */
  readonly core?: { readonly power_W: number; readonly method: Method };
  readonly ambient_degC: number;
  readonly cooling: Cooling;
}

export type ThermalState =
  | {
      readonly steady: true;
      readonly rise_K: number;
      /** Ambient plus rise: one temperature for the whole part. */
      readonly temperature_degC: number;
      /** At that temperature. */
      readonly copper: CopperLoss;
      readonly total_W: number;
      readonly method: Method;
    }
  | { readonly steady: false; readonly reason: string; readonly method: Method };

/**
 * The temperature at which a part gives off what its losses produce: T with T − T_ambient = rise(P_copper(T) + P_core).
 *
 * With ρ the resistivity, P_copper/ρ never grows with ρ (direct resistance is proportional to ρ and F_R falls as the skin depth
 * grows), and the rise goes with a power of P no higher than the first. So rise/ρ falls while (T − T_ambient)/ρ, with ρ linear in
 * T, grows: above the ambient there is one crossing or none, and the sign of (T − T_ambient) − rise at the melting point
 * tells which. The crossing is bracketed and found by Brent's method in the rise itself, so a small rise keeps its digits.
 *
 * `steady: false`, with the reason, where the crossing is not below the melting point. Throws `InvalidQuantity` at `/cooling`
 * (neither or both), `/ambient_degC` (outside the conductor's range) and as `copperLoss` at `/winding/…` and `/current/…`.
 *
 * | case                                            | worst relative error of the rise | against                      |
 * |-------------------------------------------------|----------------------------------|------------------------------|
 * | direct current, ambient −200 … 400 °C, rise      | 2e-15                            | ΔT = A/(1 − αA), closed form |
 * | 1e-13 … 890 K, copper and aluminium              |                                  |                              |
 */
export function temperatureRise(part: HeatedPart): ThermalState {
  const law = coolingLaw(part.cooling);
  const { winding, current, ambient_degC } = part;
  const conductor = winding.conductor ?? 'copper';
  const { lower_degC, upper_degC } = conductorTemperatureRange(conductor);
  if (ambient_degC <= lower_degC || ambient_degC >= upper_degC) {
    throw new InvalidQuantity(
      '/ambient_degC',
      `${conductor} is a solid with resistance between ${lower_degC.toFixed(1)} and ${upper_degC.toFixed(1)} °C`,
    );
  }
  const core_W = part.core?.power_W ?? 0;
  const heatAt = (rise_K: number) => copperLoss(winding, current, ambient_degC + rise_K).copper_W + core_W;
  const excess = (rise_K: number) => rise_K - law.rise_K(heatAt(rise_K));

  // Losses at ambient are checked for being numbers here, so that what the root finder meets is.
  if (!Number.isFinite(excess(0)))
    throw new InvalidQuantity('/cooling', 'the rise of the losses at ambient is not a finite number');
  const highest_K = (upper_degC - ambient_degC) * (1 - 1e-12);
  if (!(excess(highest_K) >= 0)) {
    return { steady: false, reason: reasonOf(part, law, heatAt(0), conductor, upper_degC), method: law.method };
  }

  const rise_K = findRoot(excess, 0, highest_K);
  const temperature_degC = ambient_degC + rise_K;
  const copper = copperLoss(winding, current, temperature_degC);
  const total_W = copper.copper_W + core_W;
  return { steady: true, rise_K, temperature_degC, copper, total_W, method: riseMethod() };

  /** First order: the law's own error and the losses', amplified by as much as heat begets heat, d rise/dT = `feedback` < 1. */
  function riseMethod(): Method {
    if (total_W === 0) return law.method;
    const core_ = core_W * (part.core?.method.relativeError ?? 0);
    const lossError = (copper.copper_W * copper.method.relativeError + core_) / total_W;
    const feedback = law.exponent * (copper.copper_W / total_W) * (rise_K / (temperature_degC - lower_degC));
    return {
      ...law.method,
      relativeError: (law.method.relativeError + law.exponent * lossError) / (1 - feedback),
    };
  }
}

interface CoolingLaw {
  readonly rise_K: (power_W: number) => number;
  /** d ln rise/d ln P. */
  readonly exponent: number;
  readonly method: Method;
}

function coolingLaw({ thermalResistance_K_per_W, surfaceArea_m2 }: Cooling): CoolingLaw {
  if (thermalResistance_K_per_W !== undefined && surfaceArea_m2 !== undefined) {
    throw new InvalidQuantity('/cooling', 'cooling is by a thermal resistance or by a surface, not both');
  }
  if (thermalResistance_K_per_W !== undefined) {
    return { rise_K: (power_W) => thermalResistance_K_per_W * power_W, exponent: 1, method: RESISTANCE };
  }
  if (surfaceArea_m2 !== undefined) {
    // mW/cm² are 0.1 of W/m².
    return { rise_K: (power_W) => (0.1 * (power_W / surfaceArea_m2)) ** 0.833, exponent: 0.833, method: SURFACE };
  }
  throw new InvalidQuantity('/cooling', 'cooling needs thermalResistance_K_per_W or surfaceArea_m2');
}

function reasonOf(
  part: HeatedPart,
  law: CoolingLaw,
  ambientHeat_W: number,
  conductor: string,
  melting_degC: number,
): string {
  const { winding, current, ambient_degC, cooling } = part;
  const start =
    `no steady temperature exists below the melting point of ${conductor} (${melting_degC.toFixed(1)} °C): ` +
    `already the losses at the ambient of ${ambient_degC} °C, ${ambientHeat_W.toPrecision(4)} W, mean a rise of ` +
    `${law.rise_K(ambientHeat_W).toPrecision(4)} K, and resistance grows with temperature`;
  if (cooling.thermalResistance_K_per_W === undefined) return start;
  // F_R tends to 1 when hot, so in the end a kelvin adds R_th·I²·dR_dc/dT kelvins, I all the current there is.
  const { lower_degC } = conductorTemperatureRange(winding.conductor ?? 'copper');
  const squares_A2 = (current.harmonics ?? []).reduce((sum, { rms_A }) => sum + rms_A * rms_A, current.direct_A ** 2);
  const { directResistance_ohm } = copperLoss(winding, { direct_A: 0 }, ambient_degC);
  const perKelvin =
    (cooling.thermalResistance_K_per_W * squares_A2 * directResistance_ohm) / (ambient_degC - lower_degC);
  return perKelvin >= 1
    ? `${start}: each kelvin brings heat for another ${perKelvin.toPrecision(4)} K, thermal runaway`
    : start;
}

const RESISTANCE: Method = {
  name: 'temperature rise by a thermal resistance, solved with the losses at the temperature reached',
  references: ['IEC 60034-1 (resistance over temperature), from memory'],
  relativeError: 0,
  validity:
    'steady state; one temperature for winding and core, no hotter spot inside; thermal resistance taken as given and constant; ' +
    'core loss taken as constant over temperature',
};

/**
 * Two published fits differ: the one used here, and 450·(W/cm²)^0.826 of W. T. McLyman, Transformer and Inductor Design Handbook,
 * which gives 1.4 to 1.5 times as much. Both from memory; the bound holds the second.
 */
const SURFACE: Method = {
  name: 'temperature rise ΔT/K = ((P/mW)/(A/cm²))^0.833 of a surface in still air, solved with the losses at the temperature reached',
  references: [
    'common practice, from memory',
    'W. T. McLyman, Transformer and Inductor Design Handbook (450 (P/A)^0.826 with W/cm², from memory)',
  ],
  relativeError: 0.5,
  validity:
    'steady state; free convection and radiation from the whole outer surface in still air, rises of about 10 to 100 K; one ' +
    'temperature for winding and core, no hotter spot inside; core loss taken as constant over temperature. ' +
    'Another published fit, 450 (P/A)^0.826, lies up to 50 % higher: the error given reaches to it',
};
