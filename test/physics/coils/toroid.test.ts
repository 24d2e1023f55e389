import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type CircularToroid, type RectangularToroid, toroidInductance } from '../../../src/physics/coils/toroid.ts';
import { VACUUM_PERMEABILITY_H_PER_M } from '../../../src/physics/constants.ts';
import { integrate } from '../../../src/physics/numerics/quadrature.ts';
import exact from '../../fixtures/mpmath/toroid.json' with { type: 'json' };
import separateTurns from '../../fixtures/scipy/toroid-turns.json' with { type: 'json' };

const rectangle = (
  innerDiameter_m: number,
  outerDiameter_m: number,
  height_m: number,
  turns = 1,
): RectangularToroid => ({
  shape: 'toroid',
  section: 'rectangle',
  turns,
  innerDiameter_m,
  outerDiameter_m,
  height_m,
});
const circle = (meanDiameter_m: number, sectionDiameter_m: number, turns = 1): CircularToroid => ({
  shape: 'toroid',
  section: 'circle',
  turns,
  meanDiameter_m,
  sectionDiameter_m,
});

describe('toroid', () => {
  it('rectangular section: exact from walls of 1e-12 to 1e6 of the hole', () => {
    expect(exact.rectangle.length).toBe(22);
    for (const [inner, outer, height, expected] of exact.rectangle as [number, number, number, number][]) {
      expect(Math.abs(toroidInductance(rectangle(inner, outer, height)).inductance_H / expected - 1)).toBeLessThan(
        1e-15,
      );
    }
  });

  it('circular section: exact from slender to closed', () => {
    expect(exact.circle.length).toBe(12);
    for (const [mean, section, expected] of exact.circle as [number, number, number][]) {
      expect(Math.abs(toroidInductance(circle(mean, section)).inductance_H / expected - 1)).toBeLessThan(1e-15);
    }
  });

  it('stores ½LI² = ∫B²/2µ dV', () => {
    const [turns, current, permeability] = [123, 4.5, 60];
    const density = (radius: number) => {
      const field = (turns * current) / (2 * Math.PI * radius);
      return (permeability * VACUUM_PERMEABILITY_H_PER_M * field * field) / 2;
    };
    const half = (inductance_H: number) => (inductance_H * current * current) / 2;

    const box = toroidInductance({ ...rectangle(0.02, 0.05, 0.015, turns), relativePermeability: permeability });
    const inBox = integrate((r) => density(r) * 2 * Math.PI * r * 0.015, 0.01, 0.025, 30);
    expect(Math.abs(half(box.inductance_H) / inBox - 1)).toBeLessThan(1e-14);

    const [mean, section] = [0.02, 0.009];
    const round = toroidInductance({ ...circle(2 * mean, 2 * section, turns), relativePermeability: permeability });
    const slice = (t: number) => {
      const r = mean + section * Math.sin(t);
      return density(r) * 2 * Math.PI * r * 2 * (section * Math.cos(t)) ** 2;
    };
    const inRound = integrate(slice, -Math.PI / 2, Math.PI / 2, 40);
    expect(Math.abs(half(round.inductance_H) / inRound - 1)).toBeLessThan(1e-14);
  });

  it('states an error that covers separate turns of round wire', () => {
    expect(separateTurns.length).toBe(28);
    for (const [turns, ratio, spacing, difference] of separateTurns as [number, number, number, number][]) {
      const { relativeError } = toroidInductance(circle(1, ratio, turns)).method;
      expect(relativeError, `${turns} turns, ${ratio}, ${spacing}`).toBeGreaterThan(Math.abs(difference));
    }
    expect(toroidInductance(circle(1, 0.4, 100)).method.relativeError).toBeLessThan(0.1);
  });

  it('goes as turns², as permeability and as size', () => {
    const length = fc.double({ min: 1e-3, max: 1, noNaN: true });
    fc.assert(
      fc.property(length, length, length, (inner, wall, height) => {
        for (const coil of [rectangle(inner, inner + wall, height), circle(inner + wall, inner)]) {
          const one = toroidInductance(coil).inductance_H;
          const many = toroidInductance({ ...coil, turns: 1000, relativePermeability: 1e4 }).inductance_H;
          expect(Math.abs(many / one / 1e10 - 1)).toBeLessThan(1e-14);
        }
        for (const scale of [1e9, 1e-9]) {
          const one = toroidInductance(rectangle(inner, inner * 3, height)).inductance_H;
          const scaled = toroidInductance(rectangle(inner * scale, inner * 3 * scale, height * scale)).inductance_H;
          expect(Math.abs(scaled / scale / one - 1)).toBeLessThan(1e-14);
        }
      }),
      { seed: 2, numRuns: 100 },
    );
  });

  it('refuses a ring without thickness or hole, naming the field', () => {
    expect(() => toroidInductance(rectangle(0.02, 0.02, 0.01))).toThrow('/outerDiameter_m');
    expect(() => toroidInductance(rectangle(0.03, 0.02, 0.01))).toThrow('/outerDiameter_m');
    expect(() => toroidInductance(circle(0.02, 0.02))).toThrow('/sectionDiameter_m');
  });
});
