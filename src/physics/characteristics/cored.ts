import type { FluxCharacteristic } from '../characteristic.ts';
import { VACUUM_PERMEABILITY_H_PER_M } from '../constants.ts';
import { type Core, coreParameters } from '../core/core.ts';
import { solveField } from '../core/field-solver.ts';
import { type GapInCircuit, gapInCircuit } from '../core/gap.ts';
import { fieldError, type MagnetisationCurve, magnetisationCurve } from '../core/magnetisation.ts';
import { InvalidQuantity, within } from '../invalid-quantity.ts';
import type { Method } from '../method.ts';

/** A winding on a magnetic core. */
export interface Cored {
  readonly shape: 'cored';
  readonly turns: number;
  readonly core: Core;
}

/** Where the stored energy sits. */
export interface StoredEnergy {
  readonly total_J: number;
  readonly core_J: number;
  readonly gap_J: number;
}

export interface CoredCharacteristic extends FluxCharacteristic {
  readonly kind: 'cored';
  /** Energy at a current, and its split. */
  storedEnergy(current_A: number): StoredEnergy;
  /** Flux density in T in the smallest section of the core, signed as the current. */
  fluxDensity_T(current_A: number): number;
  /** The current in A at which the flux density in the smallest section is `fluxDensity_T`. */
  currentAtFluxDensity_A(fluxDensity_T: number): number;
}

/** A core with its gaps, as ampere-turns see it: N·i = H·length + reluctance·B, λ = N·B·area. */
interface Circuit {
  readonly turns: number;
  readonly length_m: number;
  readonly area_m2: number;
  readonly minimumArea_m2: number;
  /** ampere-turns that the gaps take per tesla in the core, A/T */
  readonly reluctance_A_per_T: number;
  readonly gap: GapInCircuit | null;
  readonly curve: MagnetisationCurve;
}

/**
 * The flux characteristic of a cored coil by its magnetic circuit, N·i = H·l_c + B·(l_g/µ0)·(A_e/A_g): one flux through core and
 * gaps, its density in the gap thinned by fringing. Fitzgerald, Kingsley, Umans, Electric Machinery, 6th ed., section 1.1.
 *
 * l_c is the core's effective length as its sheet gives it, gap or no gap (common practice). Others take l_e − l_g, because
 * the gap is ground away from the iron; the difference is within the share l_g/l_e of the core's ampere-turns and is counted in
 * `relativeError`.
 *
 * `temperature_degC` is the core's; without it a saturation list is read at 25 °C.
 *
 * Throws `InvalidQuantity` at `/turns` or `/core…`.
 *
 * | quantity | domain | worst relative error | against |
 * |---|---|---|---|
 * | λ, apparent L, energy, co-energy | µ 1 to 1e6, gap 0 to half the core's length, i 1e-30 A to 1e6 × flux limit | 9e-16 | mpmath, 130 digits |
 * | the core's share of the energy | as above | 9e-15 | as above |
 * | differential L | as above | 3e-12, or 4e-16 of its condition at a sharp knee | as above |
 * | current at the saturation flux density | as above | 3e-13, where B hardly determines H | as above |
 */
export function coredCharacteristic(coil: Cored, temperature_degC?: number): CoredCharacteristic {
  const circuit = circuitOf(coil, temperature_degC);
  const { turns, length_m, area_m2, minimumArea_m2, reluctance_A_per_T, curve } = circuit;

  const fieldAt = (current_A: number) => solveField(curve, length_m, reluctance_A_per_T, turns * Math.abs(current_A));
  const fluxDensityAt = (current_A: number) => Math.sign(current_A) * curve.fluxDensity_T(fieldAt(current_A));
  const currentAtField = (field: number) =>
    (field * length_m + reluctance_A_per_T * curve.fluxDensity_T(field)) / turns;
  const currentAtFlux = (fluxDensity_T: number) => {
    const magnitude = Math.abs(fluxDensity_T);
    const field = solveField(curve, 0, 1, magnitude);
    return (Math.sign(fluxDensity_T) * (field * length_m + reluctance_A_per_T * magnitude)) / turns;
  };
  const fluxLinkage_Wb = (current_A: number) => turns * area_m2 * fluxDensityAt(current_A);
  const differentialInductance_H = (current_A: number) => {
    const permeability = curve.differentialPermeability_H_per_m(fieldAt(current_A));
    return turns * turns * area_m2 * (permeability / (length_m + reluctance_A_per_T * permeability));
  };
  const storedEnergy = (current_A: number): StoredEnergy => {
    const field = fieldAt(current_A);
    const core_J = area_m2 * length_m * curve.energyDensity_J_per_m3(field);
    const gap_J = area_m2 * gapEnergyDensity(circuit, field);
    return { total_J: core_J + gap_J, core_J, gap_J };
  };
  return {
    kind: 'cored',
    maximumCurrent_A: Number.POSITIVE_INFINITY,
    method: methodOf(circuit),
    slopeTurns_A: curve.slopeTurns_A_per_m.map(currentAtField),
    fluxLinkage_Wb,
    differentialInductance_H,
    apparentInductance_H: (current_A) =>
      current_A === 0 ? differentialInductance_H(0) : fluxLinkage_Wb(current_A) / current_A,
    energy_J: (current_A) => storedEnergy(current_A).total_J,
    coenergy_J(current_A) {
      const field = fieldAt(current_A);
      return area_m2 * (length_m * curve.coenergyDensity_J_per_m3(field) + gapEnergyDensity(circuit, field));
    },
    current_A: (fluxLinkage) => currentAtFlux(fluxLinkage / (turns * area_m2)),
    relativeErrorAt: (current_A) => modelError(circuit, fieldAt(current_A)),
    storedEnergy,
    fluxDensity_T: (current_A) => fluxDensityAt(current_A) * (area_m2 / minimumArea_m2),
    currentAtFluxDensity_A: (fluxDensity_T) => currentAtFlux(fluxDensity_T * (minimumArea_m2 / area_m2)),
  };
}

/** Energy of the gaps over the core's area, J/m²: the gap is linear, so energy and co-energy are alike. */
function gapEnergyDensity({ reluctance_A_per_T, curve }: Circuit, field: number): number {
  const fluxDensity_T = curve.fluxDensity_T(field);
  return (fluxDensity_T / 2) * (reluctance_A_per_T * fluxDensity_T);
}

function circuitOf({ turns, core }: Cored, temperature_degC?: number): Circuit {
  if (!(turns > 0 && Number.isFinite(turns))) throw new InvalidQuantity('/turns', `a winding has turns, not ${turns}`);
  return within('/core', () => {
    const { effectiveArea_m2, effectiveLength_m, minimumArea_m2 } = coreParameters(core);
    const gap = core.gap ? within('/gap', () => gapInCircuit(core.gap!, effectiveArea_m2, effectiveLength_m)) : null;
    return {
      turns,
      length_m: effectiveLength_m,
      area_m2: effectiveArea_m2,
      minimumArea_m2,
      reluctance_A_per_T: gap ? (gap.length_m * (effectiveArea_m2 / gap.area_m2)) / VACUUM_PERMEABILITY_H_PER_M : 0,
      gap,
      curve: within('/material', () => magnetisationCurve(core.material, temperature_degC)),
    };
  });
}

/** Effective parameters stand for a core whose flux is not quite uniform: 1 % of the ampere-turns, an estimate. */
const SECTION_ERROR = 0.01;
/** Flux of the winding beside its core: that of twice the core's section in air, over the core's length. An estimate. */
const STRAY_SECTIONS = 2;

/** Bound on the relative error of the ampere-turns at a field in the core: each part's share times how sure that part is. */
function modelError({ length_m, reluctance_A_per_T, gap, curve }: Circuit, field: number): number {
  // Toward zero field the permeability tends to its initial value.
  const permeability = field > 0 ? curve.fluxDensity_T(field) / field : curve.initialPermeability_H_per_m;
  const ampereTurnsPerField = length_m + reluctance_A_per_T * permeability;
  const coreShare = length_m / ampereTurnsPerField;
  const coreError = fieldError(curve, field) + (gap?.length_m ?? 0) / length_m;
  const gapError = gap?.relativeError ?? 0;
  // The bound on a gap comes from fields of the whole window, stray flux included: it is not counted twice.
  const strayShare = gapError > 0 ? coreShare : 1;
  const stray = (STRAY_SECTIONS * VACUUM_PERMEABILITY_H_PER_M * ampereTurnsPerField) / (permeability * length_m);
  const error = SECTION_ERROR + coreShare * coreError + (1 - coreShare) * gapError + strayShare * stray;
  return Math.min(error, 1);
}

function methodOf(circuit: Circuit): Method {
  const { gap, curve, turns, length_m, reluctance_A_per_T } = circuit;
  const sentences = [
    'one flux through core and gaps, single-valued magnetisation (no hysteresis, no remanence); the core length is its effective length whole',
  ];
  if (gap) sentences.push(`gap fringing: ${gap.fringing}`);
  if (!Number.isFinite(curve.saturationPolarisation_T))
    sentences.push('no saturation is given: linear at every current');
  if (Number.isFinite(curve.lastField_A_per_m)) {
    const field = curve.lastField_A_per_m;
    const last_A = (field * length_m + reluctance_A_per_T * curve.fluxDensity_T(field)) / turns;
    sentences.push(
      `the table's own initial slope governs, not the initial permeability; its points are used as they are at every temperature; it ends at ${last_A.toPrecision(4)} A, beyond which the core counts as fully saturated`,
    );
  }
  return {
    name: `magnetic circuit N·I = H·l_c + B·l_g/µ0 with ${curve.name}`,
    references: [
      'Fitzgerald, Kingsley, Umans, Electric Machinery, 6th ed., 1.1',
      'IEC 60205 (effective parameters)',
      ...(gap?.fringing === 'expanded-area' ? ['gap area (width + g)(depth + g): common practice'] : []),
      ...(gap?.fringing === 'conformal-map'
        ? ['Balakrishnan, Joyner, Wilson, IEEE Trans. Power Electron. 12 (1997)']
        : []),
    ],
    relativeError: modelError(circuit, 0),
    validity: sentences.join('; '),
  };
}
