import { describe, expect, it } from 'vitest';
import { linearCharacteristic } from '../../../src/physics/characteristics/linear.ts';
import type { Path } from '../../../src/physics/transients/path.ts';
import { type Interrupt, type Transient, transient } from '../../../src/physics/transients/transient.ts';
import { driveFrom, responseIntegral, responseSquareIntegral } from '../../../src/physics/transients/unit-response.ts';
import fixtures from '../../fixtures/mpmath/transients.json' with { type: 'json' };
import { disguised, saturating } from './saturating.ts';

/** Worst relative error asserted, against mpmath at 50 digits (test/fixtures/mpmath/transients.py). */
const TOLERANCE = {
  means: 3e-15,
  linear: 3e-15,
  quadrature: 5e-15,
  saturating: 2e-14,
};

/** A path whose voltage is constant + resistance·i. */
function pathOf({
  constantVoltage_V,
  pathResistance_ohm,
}: {
  constantVoltage_V: number;
  pathResistance_ohm: number;
}): Path {
  return constantVoltage_V > 0
    ? { kind: 'clamp', clamp_V: constantVoltage_V, resistance_ohm: pathResistance_ohm }
    : { kind: 'resistor', resistance_ohm: pathResistance_ohm };
}

function expectRelative(actual: number | null, expected: number | null, tolerance: number): void {
  if (actual === null || expected === null) expect(actual).toBe(expected);
  else expect(Math.abs(actual - expected)).toBeLessThanOrEqual(tolerance * Math.abs(expected));
}

describe('the response to a constant voltage', () => {
  it('has its integrals without cancellation, from no resistance to all of it', () => {
    for (const { z, ramp, squaredRamp } of fixtures.means) {
      // A unit voltage on 1 Ω from zero current: ∫ i and ∫ i² over z are z²·ramp and z³·squaredRamp.
      const drive = driveFrom(1, 1, 0);
      expectRelative(responseIntegral(drive, z) / z ** 2, ramp, TOLERANCE.means);
      expectRelative(responseSquareIntegral(drive, z) / z ** 3, squaredRamp, TOLERANCE.means);
    }
  });
});

describe('a loop without a capacitor', () => {
  const requestOf = (c: (typeof fixtures.linearLoops)[number]): Interrupt => ({
    event: 'interrupt',
    windingResistance_ohm: c.windingResistance_ohm,
    initialCurrent_A: c.initialCurrent_A,
    source_V: c.source_V,
    path: pathOf(c),
    ...(c.until_s === undefined ? {} : { until_s: c.until_s }),
    ...(c.safeCurrent_A === undefined ? {} : { safeCurrent_A: c.safeCurrent_A }),
  });
  const compare = (answer: Transient, c: (typeof fixtures.linearLoops)[number], tolerance: number) => {
    expectRelative(answer.timeToZero_s, c.expected.timeToZero_s, tolerance);
    expectRelative(answer.timeToSafe_s, c.expected.timeToSafe_s, tolerance);
    expectRelative(answer.finalCurrent_A, c.expected.finalCurrent_A, tolerance);
    expectRelative(answer.energy.delivered_J, c.expected.delivered_J, tolerance);
    expectRelative(answer.energy.winding_J, c.expected.winding_J, tolerance);
    expectRelative(answer.energy.path_J, c.expected.path_J, tolerance);
  };

  it('is exact for a constant inductance, 1e-12 to 1e6 H, 0 to 1e7 Ω, 0.7 V to 1 MV', () => {
    for (const c of fixtures.linearLoops) {
      compare(transient(linearCharacteristic(c.inductance_H), requestOf(c)), c, TOLERANCE.linear);
    }
  });

  it('comes to the same by quadrature', () => {
    for (const c of fixtures.linearLoops) {
      compare(transient(disguised(c.inductance_H), requestOf(c)), c, TOLERANCE.quadrature);
    }
  });

  it('takes a saturating inductor down, from deep saturation as well', () => {
    for (const c of fixtures.saturatingLoops.filter((each) => each.initialCurrent_A > 0)) {
      const { time_s, charge, square } = c.expected;
      const inductor = saturating(c.residual_H, c.saturation_Wb, c.knee_A);
      const answer = transient(inductor, {
        event: 'interrupt',
        windingResistance_ohm: c.windingResistance_ohm,
        initialCurrent_A: c.initialCurrent_A,
        source_V: c.source_V,
        path: pathOf(c),
        safeCurrent_A: c.finalCurrent_A,
      });
      expectRelative(answer.timeToSafe_s, time_s, TOLERANCE.saturating);
      if (c.finalCurrent_A > 0) continue;
      expectRelative(answer.timeToZero_s, time_s, TOLERANCE.saturating);
      expectRelative(answer.energy.delivered_J, c.source_V * charge, TOLERANCE.saturating);
      expectRelative(answer.energy.winding_J, c.windingResistance_ohm * square, TOLERANCE.saturating);
      const path_J = c.constantVoltage_V * charge + c.pathResistance_ohm * square;
      expectRelative(answer.energy.path_J, path_J, TOLERANCE.saturating);
    }
  });

  it('brings a saturating inductor up', () => {
    for (const c of fixtures.saturatingLoops.filter((each) => each.initialCurrent_A === 0)) {
      const inductor = saturating(c.residual_H, c.saturation_Wb, c.knee_A);
      const answer = transient(inductor, {
        event: 'energise',
        windingResistance_ohm: c.windingResistance_ohm,
        source_V: c.source_V,
        until_s: c.expected.time_s,
      });
      // Deep in saturation the current answers to an error of the time by λ/(L_d·i), the given time's own rounding included.
      const linkage = inductor.fluxLinkage_Wb(c.finalCurrent_A);
      expectRelative(inductor.fluxLinkage_Wb(answer.finalCurrent_A), linkage, TOLERANCE.saturating);
      const i = c.finalCurrent_A;
      const steepness = linkage / (inductor.differentialInductance_H(i) * i);
      const { time_s, charge, square } = c.expected;
      expectRelative(answer.finalCurrent_A, i, TOLERANCE.saturating * (1 + steepness));
      // Likewise the integrals, by what they gain in the last of that time.
      const delivered_J = c.source_V * charge;
      const winding_J = c.windingResistance_ohm * square;
      expectRelative(answer.energy.delivered_J, delivered_J, TOLERANCE.saturating * (1 + (time_s * i) / charge));
      expectRelative(answer.energy.winding_J, winding_J, TOLERANCE.saturating * (1 + (time_s * i ** 2) / square));
    }
  });
});
