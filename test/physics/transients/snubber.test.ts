import { describe, expect, it } from 'vitest';
import type { FluxCharacteristic } from '../../../src/physics/characteristic.ts';
import { linearCharacteristic } from '../../../src/physics/characteristics/linear.ts';
import { type Transient, transient } from '../../../src/physics/transients/transient.ts';
import fixtures from '../../fixtures/mpmath/transients.json' with { type: 'json' };
import { disguised, saturating } from './saturating.ts';

type LinearCase = (typeof fixtures.linearSnubbers)[number];

/**
 * Worst error asserted, against mpmath at 80 digits (linear) and its Taylor integrator at 22 digits (saturating), relative to the
 * value itself for times, peak and energies, to the initial current and the peak voltage for what swings through zero.
 */
const TOLERANCE = {
  linear: { time: 1e-14, peak: 1e-14, energy: 2e-13, swing: 1e-14 },
  stepped: { time: 1e-13, peak: 1e-13, energy: 1e-12, swing: 1e-12 },
};

function expectRelative(actual: number | null, expected: number | null, tolerance: number, scale?: number): void {
  if (actual === null || expected === null) expect(actual).toBe(expected);
  else expect(Math.abs(actual - expected)).toBeLessThanOrEqual(tolerance * (scale ?? Math.abs(expected)));
}

function interrupted(inductor: FluxCharacteristic, c: Omit<LinearCase, 'expected' | 'inductance_H'>): Transient {
  return transient(inductor, {
    event: 'interrupt',
    windingResistance_ohm: c.windingResistance_ohm,
    initialCurrent_A: c.initialCurrent_A,
    source_V: c.source_V,
    until_s: c.until_s,
    safeCurrent_A: c.safeCurrent_A,
    path: { kind: 'snubber', resistance_ohm: c.pathResistance_ohm, capacitance_F: c.capacitance_F },
  });
}

function compare(answer: Transient, c: LinearCase, tolerance: (typeof TOLERANCE)['linear']): void {
  const { expected } = c;
  expectRelative(answer.timeToZero_s, expected.timeToZero_s, tolerance.time);
  expectRelative(answer.timeToSafe_s, expected.timeToSafe_s, tolerance.time);
  expectRelative(answer.peakVoltage_V, expected.peakVoltage_V, tolerance.peak);
  expectRelative(answer.finalCurrent_A, expected.finalCurrent_A, tolerance.swing, c.initialCurrent_A);
  expectRelative(answer.energy.delivered_J, expected.delivered_J, tolerance.energy);
  const capacitor_J = (c.capacitance_F / 2) * expected.finalCapacitor_V ** 2;
  expectRelative(answer.energy.capacitor_J, capacitor_J, tolerance.energy);
  const resistance = c.windingResistance_ohm + c.pathResistance_ohm;
  const winding_J = resistance === 0 ? 0 : (c.windingResistance_ohm / resistance) * expected.resistive_J;
  expectRelative(answer.energy.winding_J, winding_J, tolerance.energy);
}

describe('a snubber', () => {
  it('on a constant inductance is exact from undamped through critical to R²C/L of 4e18, with and without source', () => {
    for (const c of fixtures.linearSnubbers) {
      compare(interrupted(linearCharacteristic(c.inductance_H), c), c, TOLERANCE.linear);
    }
  });

  it('comes to the same when stepped through', () => {
    for (const c of fixtures.linearSnubbers) {
      compare(interrupted(disguised(c.inductance_H), c), c, TOLERANCE.stepped);
    }
  });

  it('on a saturating inductor follows an independent integrator', () => {
    for (const c of fixtures.saturatingSnubbers) {
      const answer = transient(saturating(c.residual_H, c.saturation_Wb, c.knee_A), {
        event: 'interrupt',
        windingResistance_ohm: c.windingResistance_ohm,
        initialCurrent_A: c.initialCurrent_A,
        source_V: c.source_V,
        until_s: c.until_s,
        samples: c.expected.samples.length + 1,
        path: { kind: 'snubber', resistance_ohm: c.pathResistance_ohm, capacitance_F: c.capacitance_F },
      });
      const { peakVoltage_V, square } = c.expected;
      expectRelative(answer.timeToZero_s, c.expected.timeToZero_s, TOLERANCE.stepped.time);
      expectRelative(answer.peakVoltage_V, peakVoltage_V, TOLERANCE.stepped.peak);
      expectRelative(answer.energy.winding_J, c.windingResistance_ohm * square, TOLERANCE.stepped.energy);
      c.expected.samples.forEach(([time_s, current_A, voltage_V], k) => {
        expectRelative(answer.waveform.time_s[k + 1]!, time_s!, 1e-15);
        expectRelative(answer.waveform.current_A[k + 1]!, current_A!, TOLERANCE.stepped.swing, c.initialCurrent_A);
        expectRelative(answer.waveform.voltage_V[k + 1]!, voltage_V!, TOLERANCE.stepped.swing, peakVoltage_V);
      });
    }
  });

  it('is smooth through critical damping', () => {
    const at = (resistance_ohm: number) => {
      const { finalCurrent_A, peakVoltage_V, timeToSafe_s } = transient(linearCharacteristic(1), {
        event: 'interrupt',
        windingResistance_ohm: 0,
        initialCurrent_A: 1,
        safeCurrent_A: 0.05,
        until_s: 8,
        path: { kind: 'snubber', resistance_ohm, capacitance_F: 1 },
      });
      return [finalCurrent_A, peakVoltage_V, timeToSafe_s!];
    };
    const critical = at(2);
    for (let exponent = 1; exponent <= 15; exponent++) {
      for (const side of [-1, 1]) {
        at(2 * (1 + side * 10 ** -exponent)).forEach((value, k) => {
          expect(Math.abs(value - critical[k]!)).toBeLessThan(30 * 10 ** -exponent * Math.abs(critical[k]!) + 1e-14);
        });
      }
    }
  });

  it('is safe only when no swing to come is too large', () => {
    // Lightly damped: |i| first dips below 2 A on its first pass through zero, long before it stays there.
    const request = {
      event: 'interrupt',
      windingResistance_ohm: 0.1,
      initialCurrent_A: 30,
      safeCurrent_A: 2,
      samples: 20_001,
      path: { kind: 'snubber', resistance_ohm: 2, capacitance_F: 1e-6 },
    } as const;
    for (const inductor of [linearCharacteristic(1e-3), saturating(1e-5, 0.01, 10)]) {
      const { timeToSafe_s, timeToZero_s, waveform } = transient(inductor, request);
      expect(timeToSafe_s!).toBeGreaterThan(3 * timeToZero_s!);
      let lastAbove = 0;
      waveform.time_s.forEach((time_s, k) => {
        if (Math.abs(waveform.current_A[k]!) > 2) lastAbove = time_s;
      });
      const step = waveform.time_s[1]!;
      expect(timeToSafe_s!).toBeGreaterThanOrEqual(lastAbove);
      expect(timeToSafe_s!).toBeLessThanOrEqual(lastAbove + step);
      // A window that ends inside such a dip does not call it safe.
      const dip = transient(inductor, { ...request, until_s: timeToZero_s! });
      expect(Math.abs(dip.finalCurrent_A)).toBeLessThan(1e-9);
      expect(dip.timeToSafe_s).toBeNull();
    }
  });

  it('without any resistance rings for ever', () => {
    for (const inductor of [linearCharacteristic(1e-3), disguised(1e-3), saturating(1e-5, 0.01, 10)]) {
      const answer = transient(inductor, {
        event: 'interrupt',
        windingResistance_ohm: 0,
        initialCurrent_A: 30,
        safeCurrent_A: 2,
        path: { kind: 'snubber', resistance_ohm: 0, capacitance_F: 1e-6 },
      });
      expect(answer.timeToSafe_s).toBeNull();
      // Everything that was stored is in the capacitor at its fullest.
      const peak_J = (1e-6 / 2) * answer.peakVoltage_V ** 2;
      expectRelative(peak_J, answer.energy.initial_J, 1e-12);
    }
  });
});
