import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { coaxialLoopsMutualInductance_H } from '../../src/physics/coils/coaxial-loops.ts';
import type { Multilayer } from '../../src/physics/coils/multilayer.ts';
import { currentSheetInductance_H } from '../../src/physics/coils/nagaoka.ts';
import type { RoundLoop } from '../../src/physics/coils/round-loop.ts';
import type { Solenoid } from '../../src/physics/coils/solenoid.ts';
import { VACUUM_PERMEABILITY_H_PER_M } from '../../src/physics/constants.ts';
import { InvalidQuantity } from '../../src/physics/invalid-quantity.ts';
import { type CoaxialCoil, coupledCoils, mutualInductance } from '../../src/physics/mutual.ts';
import fixture from '../fixtures/mpfr/mutual.json' with { type: 'json' };

const MU0 = VACUUM_PERMEABILITY_H_PER_M;
const loop = (diameter_m: number, wireDiameter_m = 1e-18 * diameter_m, turns = 1): RoundLoop => ({
  shape: 'round-loop',
  diameter_m,
  wireDiameter_m,
  turns,
});
const solenoid = (turns: number, diameter_m: number, length_m: number, wireDiameter_m?: number): Solenoid => ({
  shape: 'solenoid',
  turns,
  diameter_m,
  length_m,
  ...(wireDiameter_m === undefined ? {} : { wireDiameter_m }),
});
const multilayer = (turns: number, innerDiameter_m: number, outerDiameter_m: number, length_m: number): Multilayer => ({
  shape: 'multilayer',
  turns,
  innerDiameter_m,
  outerDiameter_m,
  length_m,
});

/** A coil of one turn from [inner radius, outer radius, length]. */
function coilOf(section: readonly number[]): CoaxialCoil {
  const [inner, outer, length] = section as [number, number, number];
  if (inner !== outer) return multilayer(1, 2 * inner, 2 * outer, length);
  return length === 0 ? loop(2 * inner) : solenoid(1, 2 * inner, length);
}
const off = (value: number, expected: number): number =>
  expected === 0 ? Math.abs(value) : Math.abs(value / expected - 1);
const M = (first: CoaxialCoil, second: CoaxialCoil, distance: number): number =>
  mutualInductance(first, second, distance).mutualInductance_H;
const refusal = (calculate: () => unknown): string => {
  try {
    calculate();
  } catch (error) {
    if (error instanceof InvalidQuantity) return error.pointer;
    throw error;
  }
  return 'accepted';
};

describe('mutual inductance of coaxial coils', () => {
  it('and its derivative agree with the exact kernel of two sheets at 75 digits, near, nested, touching and far', () => {
    expect(fixture.cases).toHaveLength(187);
    let worst = 0;
    let worstSlope = 0;
    for (const { first, second, axialDistance_m, mutualPerMu0_m, slopePerMu0 } of fixture.cases) {
      const result = mutualInductance(coilOf(first), coilOf(second), axialDistance_m);
      worst = Math.max(worst, off(result.mutualInductance_H / MU0, mutualPerMu0_m));
      worstSlope = Math.max(
        worstSlope,
        off(result.axialForcePerAmpere2_N / MU0, axialDistance_m === 0 ? 0 : slopePerMu0),
      );
    }
    expect(worst).toBeLessThan(1e-10);
    expect(worstSlope).toBeLessThan(1e-9);
  });

  it('of two loops is Maxwell’s, from nearly touching to far apart', () => {
    for (const ratio of [1, 1 - 1e-12, 0.999, 0.5, 1e-3, 1e-6]) {
      for (const distance of [1e-12, 1e-6, 1e-3, 0.3, 1, 1e3, 1e6]) {
        const value = M(loop(2), loop(2 * ratio), distance);
        expect(off(value, coaxialLoopsMutualInductance_H(1, ratio, distance))).toBeLessThan(1e-14);
      }
    }
  });

  it('of a coil round a long solenoid tends to the published value for an endless one', () => {
    // W. Moebs, S. J. Ling, J. Sanny, University Physics vol. 2 (OpenStax, 2016), example 14.1: 500 turns on 0.750 m, radius
    // 0.0310 m, 10 turns round it: 2.53e-5 H; and ch. 14 problems: 500 turns on 0.50 m, 7.5e-3 m², 40 turns: 3.8e-4 H.
    for (const [radius, length, turns, published, tolerance] of [
      [0.031, 0.75, 10, 2.53e-5, 5e-8],
      [Math.sqrt(7.5e-3 / Math.PI), 0.5, 40, 3.8e-4, 5e-6],
    ] as const) {
      const long = M(solenoid(500e5, 2 * radius, length * 1e5), loop(2 * radius, 1e-9, turns), 0);
      expect(Math.abs(long - published)).toBeLessThan(tolerance);
      expect(off(long, (MU0 * 500 * turns * Math.PI * radius ** 2) / length)).toBeLessThan(1e-6);
      // The solenoid as it is: its ends leave less.
      const finite = M(solenoid(500, 2 * radius, length), loop(2 * radius, 1e-9, turns), 0);
      expect(finite).toBeLessThan(long);
      expect(finite).toBeGreaterThan(0.95 * long);
    }
  });

  it('is the flux of the solenoid’s vector potential through the loop', () => {
    // A of a sheet, one azimuth at a time, in closed form; the trapezoidal rule over a full period converges geometrically.
    for (const [r1, length, r2, z] of [
      [1, 2, 0.5, 0.4],
      [1, 0.3, 1.6, 0],
      [1, 5, 1.3, 4],
      [1, 1, 0.2, 30],
    ] as const) {
      let integral = 0;
      const steps = 400;
      for (let i = 0; i < steps; i++) {
        const phi = (2 * Math.PI * (i + 0.5)) / steps;
        const rho = Math.sqrt(r1 * r1 + r2 * r2 - 2 * r1 * r2 * Math.cos(phi));
        const [up, down] = [(z + length / 2) / rho, (z - length / 2) / rho];
        integral += Math.cos(phi) * (Math.asinh(up) - Math.asinh(down));
      }
      const expected = ((MU0 * r1 * r2) / length) * Math.PI * (integral / steps);
      expect(off(M(solenoid(1, 2 * r1, length), loop(2 * r2), z), expected)).toBeLessThan(1e-11);
    }
  });

  it('far away is that of two dipoles, at any distance', () => {
    const [first, second] = [multilayer(30, 0.02, 0.06, 0.03), multilayer(7, 0.01, 0.03, 0.05)];
    const meanSquare = (a: number, b: number): number => (a * a + a * b + b * b) / 12;
    const moments = 30 * 7 * Math.PI ** 2 * meanSquare(0.02, 0.06) * meanSquare(0.01, 0.03);
    for (const distance of [1e3, 1e6, 1e12, 1e30]) {
      const { mutualInductance_H, axialForcePerAmpere2_N } = mutualInductance(first, second, distance);
      const dipoles = (MU0 * moments) / (2 * Math.PI * distance ** 3);
      // The next term is of the order of (size/distance)².
      expect(off(mutualInductance_H, dipoles)).toBeLessThan(1e-11 + 0.01 / distance ** 2);
      expect(off(axialForcePerAmpere2_N, (-3 * dipoles) / distance)).toBeLessThan(1e-11 + 0.01 / distance ** 2);
    }
  });

  it('of coils cut in two adds up: with a third coil, and with each other to the self-inductance', () => {
    const whole = multilayer(12, 0.04, 0.1, 0.06);
    const third = solenoid(5, 0.11, 0.02);
    for (const [one, other, apart] of [
      [multilayer(4, 0.04, 0.1, 0.02), multilayer(8, 0.04, 0.1, 0.04), 0.03],
      [multilayer(4, 0.04, 0.06, 0.06), multilayer(8, 0.06, 0.1, 0.06), 0],
    ] as const) {
      const at = apart === 0 ? [0, 0] : [-0.02, 0.01];
      // Relative to the centre of the whole.
      const parts = M(one, third, 0.025 - at[0]!) + M(other, third, 0.025 - at[1]!);
      expect(off(parts, M(whole, third, 0.025))).toBeLessThan(1e-11);
      const { mutualInductance_H, primaryInductance_H, secondaryInductance_H } = coupledCoils({
        primary: one,
        secondary: other,
        axialDistance_m: apart,
      });
      const self = coupledCoils({ primary: whole, secondary: third, axialDistance_m: 0 }).primaryInductance_H;
      expect(off(primaryInductance_H + secondaryInductance_H + 2 * mutualInductance_H, self)).toBeLessThan(1e-10);
    }
  });

  it('of sheets that coincide is the self-inductance, and k = 1', () => {
    for (const length of [1e-6, 0.01, 1, 100, 1e6]) {
      const result = coupledCoils({
        primary: solenoid(30, 1, length),
        secondary: solenoid(20, 1, length),
        axialDistance_m: 0,
        primaryCurrent_A: 2,
        secondaryCurrent_A: -3,
      });
      expect(off(result.mutualInductance_H, currentSheetInductance_H(1, 1, length) * 600)).toBeLessThan(1e-11);
      expect(result.couplingCoefficient).toBeLessThanOrEqual(1);
      expect(result.couplingCoefficient).toBeGreaterThan(1 - 1e-11);
      // Ampere-turns cancel: no flux and no energy are left.
      expect(Math.abs(result.energy_J!)).toBeLessThan(1e-10 * result.primaryInductance_H);
      expect(result.energy_J).toBeGreaterThanOrEqual(0);
    }
  });

  it('is the same to the last digit in exchange, even in the distance, with a force that is odd', () => {
    const decade = (low: number, high: number) => fc.double({ min: low, max: high, noNaN: true }).map((x) => 10 ** x);
    const coil = fc.oneof(
      decade(-3, 0).map((d) => loop(d)),
      fc.tuple(decade(-3, 0), decade(-4, 1)).map(([d, l]) => solenoid(7, d, l)),
      fc.tuple(decade(-3, 0), decade(-4, 0), decade(-4, 1)).map(([d, b, l]) => multilayer(9, d, d * (1 + b), l)),
    );
    let compared = 0;
    fc.assert(
      fc.property(coil, coil, decade(-4, 4), (first, second, distance) => {
        if (refusal(() => mutualInductance(first, second, distance)) !== 'accepted') return;
        compared++;
        const here = mutualInductance(first, second, distance);
        const exchanged = mutualInductance(second, first, distance);
        const mirrored = mutualInductance(first, second, -distance);
        expect(exchanged.mutualInductance_H).toBe(here.mutualInductance_H);
        expect(exchanged.axialForcePerAmpere2_N).toBe(here.axialForcePerAmpere2_N);
        expect(mirrored.mutualInductance_H).toBe(here.mutualInductance_H);
        expect(mirrored.axialForcePerAmpere2_N).toBe(-here.axialForcePerAmpere2_N);
        expect(here.mutualInductance_H).toBeGreaterThan(0);
        expect(here.axialForcePerAmpere2_N).toBeLessThan(0);
      }),
      { seed: 1873, numRuns: 200 },
    );
    expect(compared).toBeGreaterThan(100);
  });

  it('scales with size: M by it, the force not at all', () => {
    const [first, second] = [multilayer(30, 0.02, 0.06, 0.03), solenoid(7, 0.07, 0.05)];
    const at = mutualInductance(first, second, 0.02);
    for (const scale of [1e-9, 1e9]) {
      const scaled = mutualInductance(
        multilayer(30, 0.02 * scale, 0.06 * scale, 0.03 * scale),
        solenoid(7, 0.07 * scale, 0.05 * scale),
        0.02 * scale,
      );
      expect(off(scaled.mutualInductance_H, scale * at.mutualInductance_H)).toBeLessThan(1e-12);
      expect(off(scaled.axialForcePerAmpere2_N, at.axialForcePerAmpere2_N)).toBeLessThan(1e-11);
    }
  });

  it('states an error that covers real turns: rings, a helix, round wire', () => {
    for (const spacing of [1, 1.5, 2]) {
      for (const gap of [0.5, 1, 3, 10, 40]) {
        // 6 layers of 8 turns at unit spacing, and round it a loop, a layer of 10 turns, and 5 layers of 4 turns.
        const inner = { coil: multilayer(48, 24, 36, 8), rings: lattice(12, 6, 8) };
        const outerRadius = 18 + gap;
        for (const [coil, rings, distance] of [
          [loop(2 * outerRadius, 1 / spacing), [[outerRadius, 0]], 2],
          [solenoid(10, 2 * outerRadius + 1, 10, 1 / spacing), lattice(outerRadius, 1, 10), 3],
          [multilayer(20, 2 * outerRadius, 2 * outerRadius + 10, 4), lattice(outerRadius, 5, 4), 0],
          [multilayer(6, 24, 36, 1), lattice(12, 6, 1), 4.5 + gap],
          [multilayer(6, 30, 32, 6), lattice(15, 1, 6), 7 + gap],
        ] as const) {
          const { mutualInductance_H, method } = mutualInductance(inner.coil, coil, distance);
          let sum = 0;
          for (const [r, z] of inner.rings) {
            for (const [r2, z2] of rings as [number, number][]) {
              sum += coaxialLoopsMutualInductance_H(r, r2, z2 + distance - z);
            }
          }
          expect(method.relativeError, `${coil.shape}, spacing ${spacing}, gap ${gap}`).toBeGreaterThan(
            off(sum, mutualInductance_H),
          );
          expect(method.relativeError).toBeLessThan(0.1);
        }
      }
    }
  });

  it('of a loop beside a helix is that of its sheet, within the error stated', () => {
    // A filament wound as a helix links ∫ A(r, z) r dφ along it, with A of the loop from Maxwell’s M = 2πr A.
    for (const [r1, r2, distance] of [
      [1, 1.2, 0.3],
      [1, 0.7, 0.9],
      [1, 1.05, 0],
    ] as const) {
      const [turns, length] = [5, 1];
      let linked = 0;
      const steps = 4000;
      for (let i = 0; i < steps; i++) {
        const z = ((i + 0.5) / steps - 0.5) * length;
        linked += (turns * coaxialLoopsMutualInductance_H(r1, r2, distance - z)) / steps;
      }
      const { mutualInductance_H, method } = mutualInductance(
        solenoid(turns, 2 * r1, length, 0.01),
        loop(2 * r2),
        distance,
      );
      expect(off(linked, mutualInductance_H)).toBeLessThan(Math.min(1e-6, method.relativeError));
    }
  });

  it('refuses coils that would be in the same place, and dimensions that cannot be', () => {
    const at = (first: CoaxialCoil, second: CoaxialCoil, distance: number): string =>
      refusal(() => mutualInductance(first, second, distance));
    const thick = multilayer(10, 0.04, 0.08, 0.02);
    const place = '/axialDistance_m';
    expect(at(thick, thick, 0.019)).toBe(place);
    expect(at(thick, thick, 0.02)).toBe('accepted');
    expect(at(thick, multilayer(10, 0.08, 0.1, 0.02), 0)).toBe('accepted');
    expect(at(thick, multilayer(10, 0.079, 0.1, 0.02), 0)).toBe(place);
    expect(at(thick, multilayer(10, 0.079, 0.1, 0.02), -0.02)).toBe('accepted');
    expect(at(thick, solenoid(10, 0.06, 0.001), 0)).toBe(place);
    expect(at(thick, solenoid(10, 0.08, 0.05), 0)).toBe('accepted');
    expect(at(thick, solenoid(10, 0.0805, 0.05, 0.001), 0)).toBe(place);
    expect(at(thick, solenoid(10, 0.081, 0.05, 0.001), 0)).toBe('accepted');
    expect(at(thick, loop(0.06, 1e-3), 0.009)).toBe(place);
    expect(at(thick, loop(0.06, 1e-3), 0.0104)).toBe(place);
    expect(at(thick, loop(0.06, 1e-3), 0.0105)).toBe('accepted');
    expect(at(loop(0.1, 2e-3), loop(0.1, 1e-3), 0)).toBe(place);
    expect(at(loop(0.1, 2e-3), loop(0.1, 1e-3), 0.0014)).toBe(place);
    expect(at(loop(0.1, 2e-3), loop(0.1, 1e-3), 0.0015)).toBe('accepted');
    expect(at(loop(0.1, 1e-20), loop(0.1, 1e-20), 0)).toBe(place);
    // On a sheet of no known wire a loop may lie, but not on its very end.
    expect(at(solenoid(10, 0.1, 0.05), loop(0.1, 1e-3), 0)).toBe('accepted');
    expect(at(solenoid(10, 0.1, 0.05), loop(0.1, 1e-3), 0.025)).toBe(place);
    // Side by side and interleaved layers of known wire; the end wire is half a pitch inside the length.
    expect(at(solenoid(10, 0.1, 0.01, 1e-3), solenoid(10, 0.1, 0.01, 1e-3), 0.01)).toBe('accepted');
    expect(at(solenoid(10, 0.1, 0.01, 1e-3), solenoid(10, 0.1, 0.01, 1e-3), 0.005)).toBe(place);
    expect(at(solenoid(10, 0.1, 0.02, 1e-3), solenoid(10, 0.1, 0.02, 1e-3), 0.001)).toBe('accepted');
    expect(at(solenoid(10, 0.1, 0.01, 1e-3), loop(0.1, 1e-3), 0)).toBe(place);
    expect(at(solenoid(10, 0.1, 0.02, 1e-3), loop(0.1, 1e-3), 0)).toBe('accepted');
    expect(at(multilayer(10, 0.04, 0.04, 0.02), thick, 1)).toBe('/primary/outerDiameter_m');
    expect(at(thick, loop(0.04, 0.05), 1)).toBe('/secondary/wireDiameter_m');
    expect(at(thick, solenoid(10, 0.04, 0.05, 0.06), 1)).toBe('/secondary/wireDiameter_m');
    expect(at(thick, thick, 1e308)).toBe(place);
    expect(at(thick, solenoid(10, 0.1, 1e-308), 0)).toBe('/secondary/length_m');
    expect(at(solenoid(10, 1e-308, 1), thick, 0)).toBe('/primary/diameter_m');
    expect(at(solenoid(1e200, 1, 1), solenoid(1e200, 1, 1), 0)).toBe('/primary/turns');
  });
});

/** Radius and height of `layers` × `perLayer` turns at unit spacing. */
function lattice(innerRadius: number, layers: number, perLayer: number): [number, number][] {
  return Array.from({ length: layers * perLayer }, (_, i) => [
    innerRadius + (i % layers) + 0.5,
    Math.floor(i / layers) - (perLayer - 1) / 2,
  ]);
}

describe('coupled coils', () => {
  const primary = multilayer(300, 0.04, 0.07, 0.03);
  const secondary = solenoid(40, 0.08, 0.05, 1e-3);
  const at = (axialDistance_m: number, primaryCurrent_A: number, secondaryCurrent_A: number) =>
    coupledCoils({ primary, secondary, axialDistance_m, primaryCurrent_A, secondaryCurrent_A });

  it('have the energy of their inductance matrix, never negative', () => {
    for (const [i1, i2] of [
      [2, 5],
      [-2, 5],
      [0, 3],
      [1, 0],
    ] as const) {
      const pair = at(0.01, i1, i2);
      const { primaryInductance_H: l1, secondaryInductance_H: l2, mutualInductance_H: m } = pair;
      expect(off(pair.energy_J!, 0.5 * l1 * i1 * i1 + 0.5 * l2 * i2 * i2 + m * i1 * i2)).toBeLessThan(1e-14);
      expect(pair.energy_J).toBeGreaterThan(0);
      expect(pair.couplingCoefficient).toBeCloseTo(m / Math.sqrt(l1 * l2), 14);
    }
  });

  it('pull with the gradient of the energy at constant currents, towards each other where the currents agree', () => {
    const step = 1e-5;
    for (const distance of [-0.05, -0.004, 0.004, 0.02, 0.3]) {
      const force = at(distance, 2, 3).axialForce_N!;
      // Fourth-order difference of the energy.
      const w = (z: number): number => at(z, 2, 3).energy_J! - at(0.5, 2, 3).energy_J!;
      const gradient =
        (8 * (w(distance + step) - w(distance - step)) - (w(distance + 2 * step) - w(distance - 2 * step))) /
        (12 * step);
      expect(off(force, gradient)).toBeLessThan(1e-5);
      expect(Math.sign(force)).toBe(-Math.sign(distance));
      expect(at(distance, 2, -3).axialForce_N).toBe(-force);
    }
    expect(at(0, 2, 3).axialForce_N).toBe(0);
  });

  it('give no energy without currents, and refuse one current alone', () => {
    const bare = coupledCoils({ primary, secondary, axialDistance_m: 0 });
    expect(bare.energy_J).toBeUndefined();
    expect(bare.axialForce_N).toBeUndefined();
    expect(refusal(() => coupledCoils({ primary, secondary, axialDistance_m: 0, primaryCurrent_A: 1 }))).toBe(
      '/secondaryCurrent_A',
    );
    expect(refusal(() => coupledCoils({ primary, secondary, axialDistance_m: 0, secondaryCurrent_A: 1 }))).toBe(
      '/primaryCurrent_A',
    );
    expect(refusal(() => at(0, 1e200, 1e200))).toBe('/primaryCurrent_A');
  });

  it('refuse layers wound into each other, which their sheets cannot tell apart', () => {
    const layer = solenoid(20, 0.07, 0.04, 1e-3);
    expect(refusal(() => coupledCoils({ primary: layer, secondary: layer, axialDistance_m: 0 }))).toBe(
      '/axialDistance_m',
    );
  });
});
