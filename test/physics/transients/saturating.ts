import type { FluxCharacteristic } from '../../../src/physics/characteristic.ts';
import type { Method } from '../../../src/physics/method.ts';
import { findRoot } from '../../../src/physics/numerics/roots.ts';

const METHOD: Method = { name: 'test', references: [], relativeError: 0, validity: 'in tests' };

/** λ = L∞·i + Λs·tanh(i/Is): all its functions in closed form but the inverse. */
export function saturating(
  residual_H: number,
  saturation_Wb: number,
  knee_A: number,
  maximumCurrent_A = Number.POSITIVE_INFINITY,
): FluxCharacteristic {
  const check = (i: number) => {
    if (Math.abs(i) > maximumCurrent_A) throw new RangeError(`${i} A is beyond ${maximumCurrent_A} A`);
  };
  const flux = (i: number) => {
    check(i);
    return residual_H * i + saturation_Wb * Math.tanh(i / knee_A);
  };
  // ln cosh x without overflow.
  const logCosh = (x: number) => {
    const y = Math.abs(x);
    return y < 1 ? -Math.log1p(-(Math.tanh(y) ** 2)) / 2 : y + Math.log1p(Math.exp(-2 * y)) - Math.LN2;
  };
  const coenergy_J = (i: number) => {
    check(i);
    return (residual_H * i * i) / 2 + saturation_Wb * knee_A * logCosh(i / knee_A);
  };
  // 1 − tanh² without cancellation.
  const sech2 = (x: number) => 1 / Math.cosh(Math.min(Math.abs(x), 350)) ** 2;
  // x·tanh x − ln cosh x, with ln cosh x = −½ log(1 − tanh² x) where both parts are small.
  const storedShape = (x: number) => {
    const t = Math.tanh(x);
    return Math.abs(x) < 1 ? x * t + Math.log1p(-t * t) / 2 : x * t - logCosh(x);
  };
  const differential = (i: number) => {
    check(i);
    return residual_H + (saturation_Wb / knee_A) * sech2(i / knee_A);
  };
  return {
    kind: Number.isFinite(maximumCurrent_A) ? 'measured' : 'cored',
    maximumCurrent_A,
    method: METHOD,
    fluxLinkage_Wb: flux,
    differentialInductance_H: differential,
    apparentInductance_H: (i) => (i === 0 ? differential(0) : flux(i) / i),
    energy_J: (i) => {
      check(i);
      return (residual_H * i * i) / 2 + saturation_Wb * knee_A * storedShape(i / knee_A);
    },
    coenergy_J,
    current_A: (linkage) =>
      findRoot((i) => flux(i) - linkage, -Math.abs(linkage) / residual_H, Math.abs(linkage) / residual_H),
  };
}

/** A constant inductance that says it is cored, so that it goes the way of one that saturates. */
export function disguised(inductance_H: number): FluxCharacteristic {
  const energy_J = (i: number) => (inductance_H * i * i) / 2;
  return {
    kind: 'cored',
    maximumCurrent_A: Number.POSITIVE_INFINITY,
    method: METHOD,
    fluxLinkage_Wb: (i) => inductance_H * i,
    differentialInductance_H: () => inductance_H,
    apparentInductance_H: () => inductance_H,
    energy_J,
    coenergy_J: energy_J,
    current_A: (linkage) => linkage / inductance_H,
  };
}
