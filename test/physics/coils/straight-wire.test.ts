import { describe, expect, it } from 'vitest';
import { straightWireInductance } from '../../../src/physics/coils/straight-wire.ts';
import { VACUUM_PERMEABILITY_H_PER_M } from '../../../src/physics/constants.ts';
import reference from '../../fixtures/mpmath/round-bars.json' with { type: 'json' };

const wire = (length_m: number, wireDiameter_m: number) =>
  straightWireInductance({ shape: 'straight-wire', length_m, wireDiameter_m });

describe('straight round wire', () => {
  it('agrees with the integral over coaxial loops, length/diameter 1e-9 to 1e12', () => {
    for (const [length, radius, integral] of reference.self as [number, number, number][]) {
      const expected = (VACUUM_PERMEABILITY_H_PER_M / (4 * Math.PI)) * integral;
      expect(Math.abs(wire(length, 2 * radius).inductance_H / expected - 1)).toBeLessThan(2e-15);
    }
  });

  it('tends to Rosa’s long wire, 0.002 l [ln(4l/d) − 3/4] µH with l in cm', () => {
    const [length_cm, diameter_cm] = [1e4, 0.1];
    const rosa_H = 0.002e-6 * length_cm * (Math.log((4 * length_cm) / diameter_cm) - 0.75);
    // What Rosa's short form drops is 0.9 ρ/l of a bracket of 12; his µ0 is 4π·1e-7.
    expect(Math.abs(wire(length_cm / 100, diameter_cm / 100).inductance_H / rosa_H - 1)).toBeLessThan(4e-7);
  });

  it('scales with its size', () => {
    const unit = wire(0.3, 1e-3).inductance_H;
    for (const scale of [1e9, 1e-9])
      expect(wire(0.3 * scale, 1e-3 * scale).inductance_H / scale / unit).toBeCloseTo(1, 13);
  });

  it('says how far the ends are open: little for a long wire, everything for a disc', () => {
    expect(wire(1, 1e-3).method.relativeError).toBeLessThan(5e-5);
    expect(wire(1e-4, 1e-3).method.relativeError).toBeGreaterThan(1);
    expect(wire(1, 1e-3).method.validity).toMatch(/partial inductance/i);
  });
});
