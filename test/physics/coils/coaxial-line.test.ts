import { describe, expect, it } from 'vitest';
import { coaxialLineInductance } from '../../../src/physics/coils/coaxial-line.ts';
import { VACUUM_PERMEABILITY_H_PER_M } from '../../../src/physics/constants.ts';
import reference from '../../fixtures/mpmath/coaxial-line.json' with { type: 'json' };

const line = (length_m: number, innerDiameter_m: number, shieldInnerDiameter_m: number, outer?: number) =>
  coaxialLineInductance({
    shape: 'coaxial-line',
    length_m,
    innerDiameter_m,
    shieldInnerDiameter_m,
    ...(outer === undefined ? {} : { shieldOuterDiameter_m: outer }),
  });

const unit = VACUUM_PERMEABILITY_H_PER_M / (2 * Math.PI);

describe('coaxial line', () => {
  it('agrees with the energy of its field, gap and shield from 1e-12 to 1e6 of the radius', () => {
    expect(reference.line.length).toBe(130);
    for (const [inner, shield, outer, expected] of reference.line as [number, number, number | null, number][]) {
      const got = line(3, inner, shield, outer ?? undefined).inductance_H / (3 * unit);
      expect(Math.abs(got / expected - 1)).toBeLessThan(2e-15);
    }
  });

  it('gives the published 4.16e-7 H/m outside the conductors for radii 0.50 and 4.00 mm (OpenStax, University Physics 2, ch. 14)', () => {
    // and µ0/8π = 5.0e-8 H/m inside the inner one, standard result, the same for every radius.
    const whole = line(1, 1e-3, 8e-3).inductance_H;
    expect(Math.abs(whole - 5.0e-8 - 4.16e-7)).toBeLessThan(5e-10);
  });

  it('has only the inside of the inner conductor left when the gap and the shield vanish', () => {
    expect(line(1, 1, 1 + 2e-12, 1 + 4e-12).inductance_H / (unit * 0.25)).toBeCloseTo(1, 10);
  });

  it('adds (c − b)/3b for a thin shield, without a step where the series takes over', () => {
    for (const thickness of [1e-12, 1e-9, 1e-6]) {
      const added = line(1, 1, 2, 2 * (1 + thickness)).inductance_H - line(1, 1, 2).inductance_H;
      expect(Math.abs(added / unit - thickness / 3)).toBeLessThan(1e-15 + thickness * thickness);
    }
    const edge = Math.sqrt(3); // w = 1/2
    const ratio =
      line(1, 1, 2, 2 * edge * (1 - 1e-14)).inductance_H / line(1, 1, 2, 2 * edge * (1 + 1e-14)).inductance_H;
    expect(Math.abs(ratio - 1)).toBeLessThan(1e-13);
  });

  it('bounds what the ends of a line cut off square do, from a fifth of a radius to a hundred', () => {
    expect(reference.ends.length).toBe(125);
    for (const [length, inner, outer, difference] of reference.ends as [number, number, number, number][]) {
      const { inductance_H, method } = line(length, 2 * inner, 2, outer > 1 ? 2 * outer : undefined);
      expect(Math.abs(difference * unit)).toBeLessThan(method.relativeError * inductance_H);
    }
  });

  it('refuses conductors that do not fit in each other', () => {
    expect(() => line(1, 2e-3, 2e-3)).toThrow('/shieldInnerDiameter_m');
    expect(() => line(1, 1e-3, 2e-3, 2e-3)).toThrow('/shieldOuterDiameter_m');
    expect(() => line(1, 1e-3, 2e-3, 1.5e-3)).toThrow('/shieldOuterDiameter_m');
  });
});
