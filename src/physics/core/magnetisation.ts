import { VACUUM_PERMEABILITY_H_PER_M } from '../constants.ts';
import { InvalidQuantity, within } from '../invalid-quantity.ts';
import { tabulatedMagnetisation } from './magnetisation-table.ts';
import { type Magnetisation, type Material, saturationFluxDensity_T } from './material.ts';

/**
 * The magnetisation curve of a material at one temperature: single-valued (no hysteresis), odd, rising. Fields H in A/m, flux
 * densities B in T; every function takes H ≥ 0 and the caller keeps the sign.
 */
export interface MagnetisationCurve {
  readonly name: string;
  /** Least upper bound of the polarisation J = B − µ0 H in T; Infinity for a linear material. */
  readonly saturationPolarisation_T: number;
  /** dB/dH in H/m at H = 0. */
  readonly initialPermeability_H_per_m: number;
  /** Fields in A/m between which dB/dH is monotone; at least one, which serves as the scale of the curve. */
  readonly slopeTurns_A_per_m: readonly number[];
  /** Last field in A/m that a table knows; Infinity for a closed form. */
  readonly lastField_A_per_m: number;
  /** B(H) in T */
  fluxDensity_T(field_A_per_m: number): number;
  /** dB/dH in H/m */
  differentialPermeability_H_per_m(field_A_per_m: number): number;
  /** ∫ H dB from zero in J/m³: what a cubic metre stores */
  energyDensity_J_per_m3(field_A_per_m: number): number;
  /** ∫ B dH from zero in J/m³ */
  coenergyDensity_J_per_m3(field_A_per_m: number): number;
}

/**
 * A closed form J = Js·f(x) of x = χ µ0 H/Js ≥ 0, with f(0) = 0, f'(0) = 1, f(∞) = 1, and its two integrals over x divided by x,
 * which stay between 0 and 1 for every x up to infinity.
 */
interface Law {
  /** f */
  readonly value: (x: number) => number;
  /** f' */
  readonly slope: (x: number) => number;
  /** (1/x) ∫₀ˣ f dx */
  readonly coenergy: (x: number) => number;
  /** (1/x) ∫₀ˣ x f' dx */
  readonly energy: (x: number) => number;
}

const LN2 = Math.LN2;

/** ln cosh x, by log1p of sinh² near zero and by the exponential that is left of it far out. */
function logCosh(x: number): number {
  return x < 1 ? Math.log1p(Math.sinh(x) ** 2) / 2 : x - LN2 + Math.log1p(Math.exp(-2 * x));
}

/** f = tanh x; ∫f = ln cosh x; ∫x f' = x tanh x − ln cosh x, which tends to ln 2: written so that no x is left to cancel. */
const HYPERBOLIC_TANGENT: Law = {
  value: Math.tanh,
  slope: (x) => (x < 350 ? Math.cosh(x) ** -2 : 0),
  coenergy: (x) => limit(x, 1, () => logCosh(x) / x),
  energy: (x) =>
    limit(x, 0, () => {
      if (x < 1) return Math.tanh(x) - logCosh(x) / x;
      const e = Math.exp(-2 * x);
      return (LN2 - Math.log1p(e)) / x - (2 * e) / (1 + e);
    }),
};

const HALF_PI = Math.PI / 2;

/** f = (2/π) atan(πx/2), with u = πx/2: ∫x f' = (2/π²) ln(1 + u²), ∫f = x f − ∫x f'. */
const ARCTANGENT: Law = {
  value: (x) => Math.atan(HALF_PI * x) / HALF_PI,
  slope: (x) => 1 / (1 + (HALF_PI * x) ** 2),
  coenergy: (x) => limit(x, 1, () => ARCTANGENT.value(x) - ARCTANGENT.energy(x)),
  energy: (x) => limit(x, 0, () => logOnePlusSquare(HALF_PI * x) / (HALF_PI * Math.PI * x)),
};

/** ln(1 + u²) without u² overflowing. */
function logOnePlusSquare(u: number): number {
  return u < 1e100 ? Math.log1p(u * u) : 2 * Math.log(u);
}

/** f = x/(1 + x); ∫f = x − ln(1 + x); ∫x f' = ln(1 + x) − x/(1 + x). */
const FROEHLICH: Law = {
  value: (x) => (x < 1 ? x / (1 + x) : 1 / (1 / x + 1)),
  slope: (x) => (1 + x) ** -2,
  coenergy: (x) =>
    limit(x, 1, () => {
      if (x >= 1) return 1 - Math.log1p(x) / x;
      const z = x / (2 + x);
      return z - (2 * logRemainder(z)) / x;
    }),
  energy: (x) =>
    limit(x, 0, () => {
      if (x >= 1) return Math.log1p(x) / x - 1 / (1 + x);
      const z = x / (2 + x);
      return z / (1 + x) + (2 * logRemainder(z)) / x;
    }),
};

/**
 * z³/3 + z⁵/5 + …: with z = x/(2 + x), ln(1 + x) = 2(z + this), so that the leading terms, which cancel in both of Fröhlich's
 * integrals, are taken out by algebra. For z up to 1/3 seventeen terms reach the last place.
 */
function logRemainder(z: number): number {
  const q = z * z;
  let sum = 0;
  for (let n = 35; n >= 3; n -= 2) sum = sum * q + 1 / n;
  return sum * q * z;
}

/** The ends of a law's integrals, where the quotient itself would be 0/0 or ∞/∞. */
function limit(x: number, atInfinity: number, between: () => number): number {
  if (x === 0) return 0;
  return x === Number.POSITIVE_INFINITY ? atInfinity : between();
}

const LAWS: Readonly<Record<Extract<Magnetisation, string>, Law>> = {
  'hyperbolic-tangent': HYPERBOLIC_TANGENT,
  arctangent: ARCTANGENT,
  froehlich: FROEHLICH,
};

/**
 * The magnetisation curve of `material` at `temperature_degC` (default 25 °C). With Js the saturation flux density there and
 * χ = initialPermeability − 1, always B = µ0 H + J with
 *
 * - `hyperbolic-tangent` J = Js tanh(χ µ0 H/Js): sharp knee, saturates exponentially;
 * - `arctangent`         J = Js (2/π) atan(π χ µ0 H/(2 Js)): soft knee, saturates as 1/H;
 * - `froehlich`          J = χ µ0 H/(1 + χ µ0 H/Js): softest, Fröhlich (1881) and Kennelly (1891), from memory;
 * - a table: see `tabulatedMagnetisation`. Its own initial slope and saturation govern, not `initialPermeability` nor Js.
 *
 * Without a saturation flux density a named form has nothing to saturate to: the material is linear.
 *
 * Throws `InvalidQuantity` at `/initialPermeability` (below 1: no soft magnetic material), `/saturation…`, `/magnetisation…`.
 *
 * | quantity | domain | worst relative error | against |
 * |---|---|---|---|
 * | B, ∫H dB, ∫B dH of each law | H 1e-12 to 1e12 A/m, µ 1 to 1e9, Js 0.1 to 2.4 T | 5e-16, 7e-16, 9e-16 | mpmath, 60 digits |
 * | dB/dH | as above | 5e-16 (1 + x), x up to 40: tanh's slope turns on the rounding of x | as above |
 */
export function magnetisationCurve(material: Material, temperature_degC?: number): MagnetisationCurve {
  const { initialPermeability, magnetisation = 'hyperbolic-tangent' } = material;
  if (!(initialPermeability >= 1 && Number.isFinite(initialPermeability))) {
    throw new InvalidQuantity(
      '/initialPermeability',
      `a relative permeability is at least 1, not ${initialPermeability}`,
    );
  }
  const saturation_T = saturationFluxDensity_T(material, temperature_degC);
  if (typeof magnetisation !== 'string') return within('/magnetisation', () => tabulatedMagnetisation(magnetisation));
  if (saturation_T === null) return linearMagnetisation(initialPermeability);
  return closedForm(magnetisation, initialPermeability - 1, saturation_T);
}

function linearMagnetisation(relativePermeability: number): MagnetisationCurve {
  const permeability = relativePermeability * VACUUM_PERMEABILITY_H_PER_M;
  const density = (field: number) => (field / 2) * (permeability * field);
  return {
    name: 'constant permeability',
    saturationPolarisation_T: Number.POSITIVE_INFINITY,
    initialPermeability_H_per_m: permeability,
    slopeTurns_A_per_m: [1],
    lastField_A_per_m: Number.POSITIVE_INFINITY,
    fluxDensity_T: (field) => permeability * field,
    differentialPermeability_H_per_m: () => permeability,
    energyDensity_J_per_m3: density,
    coenergyDensity_J_per_m3: density,
  };
}

function closedForm(
  name: Extract<Magnetisation, string>,
  susceptibility: number,
  saturation_T: number,
): MagnetisationCurve {
  const law = LAWS[name];
  const mu0 = VACUUM_PERMEABILITY_H_PER_M;
  const reach = (field: number) => (susceptibility * mu0 * field) / saturation_T;
  const vacuum = (field: number) => (field / 2) * (mu0 * field);
  return {
    name: `${name} magnetisation`,
    saturationPolarisation_T: susceptibility > 0 ? saturation_T : 0,
    initialPermeability_H_per_m: (1 + susceptibility) * mu0,
    slopeTurns_A_per_m: [saturation_T / ((susceptibility || 1) * mu0)],
    lastField_A_per_m: Number.POSITIVE_INFINITY,
    fluxDensity_T: (field) => mu0 * field + saturation_T * law.value(reach(field)),
    differentialPermeability_H_per_m: (field) => mu0 * (1 + susceptibility * law.slope(reach(field))),
    // Js²/(χµ0)·∫x f' dx = H·Js·(∫x f' dx)/x: no division by χ, which is zero in vacuum.
    energyDensity_J_per_m3: (field) => vacuum(field) + field * saturation_T * law.energy(reach(field)),
    coenergyDensity_J_per_m3: (field) => vacuum(field) + field * saturation_T * law.coenergy(reach(field)),
  };
}

/** A smooth curve through a table's points, against the material between them: 2 % of the field, an estimate. */
const TABLE_ERROR = 0.02;
/** Of what a closed form adds to the field by bending, or a table by ending, half may be wrong: an estimate. */
const BEND_ERROR = 0.5;

/**
 * Bound on the relative error of the field that the curve gives to a flux density, as a description of the material: none where a closed
 * form is still straight, half of its bend beyond. The initial permeability and the saturation are the caller's and taken as exact.
 */
export function fieldError(curve: MagnetisationCurve, field_A_per_m: number): number {
  if (Number.isFinite(curve.lastField_A_per_m)) {
    const beyond = Math.max(field_A_per_m / curve.lastField_A_per_m, 1);
    return TABLE_ERROR + BEND_ERROR * (1 - 1 / beyond);
  }
  if (field_A_per_m === 0) return 0;
  const straightness = curve.fluxDensity_T(field_A_per_m) / field_A_per_m / curve.initialPermeability_H_per_m;
  return BEND_ERROR * Math.max(1 - straightness, 0);
}
