import { describe, expect, it } from 'vitest';
import { parallelWiresInductance } from '../../../src/physics/coils/parallel-wires.ts';
import { rectangularLoopInductance } from '../../../src/physics/coils/rectangular-loop.ts';
import { straightWireInductance } from '../../../src/physics/coils/straight-wire.ts';
import { VACUUM_PERMEABILITY_H_PER_M } from '../../../src/physics/constants.ts';
import { InvalidQuantity } from '../../../src/physics/invalid-quantity.ts';
import reference from '../../fixtures/mpmath/round-bars.json' with { type: 'json' };

const line = (length_m: number, spacing_m: number, wireDiameter_m: number) =>
  parallelWiresInductance({ shape: 'parallel-wires', length_m, spacing_m, wireDiameter_m });

describe('go and return of round wires', () => {
  it('agrees with Hankel’s integral over both sections', () => {
    for (const [length, radius, distance, integral] of reference.difference as [number, number, number, number][]) {
      const expected = (VACUUM_PERMEABILITY_H_PER_M / (2 * Math.PI)) * integral;
      const error = Math.abs(line(length, distance, 2 * radius).inductance_H / expected - 1);
      expect(error).toBeLessThan(length / radius < 0.1 ? 2e-11 : 2e-14);
    }
  });

  it('tends to Maxwell’s µ0/π [ln(D/ρ) + 1/4] a metre, exact for uniform current also where the wires touch', () => {
    for (const spacing of [1e-3, 2e-3, 1]) {
      const perMetre = (VACUUM_PERMEABILITY_H_PER_M / Math.PI) * (Math.log(spacing / 0.5e-3) + 0.25);
      expect(Math.abs(line(1e12, spacing, 1e-3).inductance_H / 1e12 / perMetre - 1)).toBeLessThan(1e-12);
    }
  });

  it('is two wires apart once they are far from each other', () => {
    const alone = straightWireInductance({ shape: 'straight-wire', length_m: 0.1, wireDiameter_m: 1e-3 }).inductance_H;
    expect(Math.abs(line(0.1, 1e9, 1e-3).inductance_H / (2 * alone) - 1)).toBeLessThan(1e-10);
  });

  it('calls its error what the links that close it would add', () => {
    for (const [length, spacing] of [
      [1, 0.01],
      [0.1, 0.05],
    ] as const) {
      const open = line(length, spacing, 1e-3);
      const closed = rectangularLoopInductance({
        shape: 'rectangular-loop',
        sideA_m: length,
        sideB_m: spacing,
        wireDiameter_m: 1e-3,
      });
      expect(closed.inductance_H / open.inductance_H - 1).toBeCloseTo(open.method.relativeError, 12);
    }
  });

  it('refuses wires that overlap and takes wires that touch', () => {
    expect(() => line(1, 0.999e-3, 1e-3)).toThrow(InvalidQuantity);
    expect(() => line(1, 0.999e-3, 1e-3)).toThrow('/spacing_m');
    expect(line(1, 1e-3, 1e-3).inductance_H).toBeGreaterThan(0);
  });
});
