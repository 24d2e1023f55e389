import { describe, expect, it } from 'vitest';
import {
  parallelFilaments_m,
  roundBarSelf_m,
  roundBarSelfLessAbreast_m,
} from '../../../src/physics/coils/round-bars.ts';
import reference from '../../fixtures/mpmath/round-bars.json' with { type: 'json' };

const own = reference.self as [number, number, number][];
const differences = reference.difference as [number, number, number, number][];

describe('Neumann’s integral of round bars', () => {
  it('of a bar with itself agrees with the integral over coaxial loops, length/diameter 1e-9 to 1e12', () => {
    expect(own.length).toBe(18);
    for (const [length, radius, expected] of own) {
      expect(Math.abs(roundBarSelf_m(length, radius) / expected - 1)).toBeLessThan(1e-15);
    }
  });

  it('of a bar with itself less its neighbour agrees with Hankel’s integral, touching wires included', () => {
    expect(differences.length).toBe(45);
    for (const [length, radius, distance, expected] of differences) {
      const error = Math.abs(roundBarSelfLessAbreast_m(length, radius, distance) / expected - 1);
      expect(error).toBeLessThan(length / radius < 0.1 ? 2e-11 : 2e-14);
    }
  });

  it('does not jump where it changes from one form to the other', () => {
    const below = 1 - 1e-12;
    expect(Math.abs(roundBarSelf_m(below, 1) / roundBarSelf_m(1, 1) - 1)).toBeLessThan(3e-12);
    for (const distance of [2, 3.9, 4.1, 50]) {
      const [short, long] = [(distance / 2) * below, distance / 2];
      const ratio = roundBarSelfLessAbreast_m(short, 1, distance) / roundBarSelfLessAbreast_m(long, 1, distance);
      expect(Math.abs(ratio - 1)).toBeLessThan(3e-12);
    }
    for (const length of [0.5, 3, 1e4]) {
      const ratio = roundBarSelfLessAbreast_m(length, 1, 4 * below) / roundBarSelfLessAbreast_m(length, 1, 4);
      expect(Math.abs(ratio - 1)).toBeLessThan(3e-12);
    }
  });

  it('keeps its digits in every unit of length', () => {
    const unit = roundBarSelfLessAbreast_m(3, 0.1, 0.25);
    for (const scale of [1e9, 1e-9, 1e150, 1e-150]) {
      expect(Math.abs(roundBarSelfLessAbreast_m(3 * scale, 0.1 * scale, 0.25 * scale) / scale / unit - 1)).toBeLessThan(
        1e-14,
      );
      expect(Math.abs(roundBarSelf_m(3 * scale, 0.1 * scale) / scale / roundBarSelf_m(3, 0.1) - 1)).toBeLessThan(1e-14);
      expect(parallelFilaments_m(scale, scale) / scale / parallelFilaments_m(1, 1)).toBeCloseTo(1, 14);
    }
  });

  it('far apart, filaments have the inverse of their distance times both lengths', () => {
    expect(parallelFilaments_m(1e-3, 1e6) / (1e-6 / 1e6)).toBeCloseTo(1, 14);
  });
});
