import { describe, expect, it } from 'vitest';
import { type RoundLoop, roundLoopInductance } from '../../../src/physics/coils/round-loop.ts';
import { VACUUM_PERMEABILITY_H_PER_M } from '../../../src/physics/constants.ts';
import { InvalidQuantity } from '../../../src/physics/invalid-quantity.ts';
import harmonics from '../../fixtures/mpmath/round-loop.json' with { type: 'json' };
import quadrature from '../../fixtures/scipy/round-loop-quadrature.json' with { type: 'json' };

const loop = (diameter_m: number, wireDiameter_m: number): RoundLoop => ({
  shape: 'round-loop',
  diameter_m,
  wireDiameter_m,
});

describe('round loop', () => {
  it('published: radius 25 cm, wire radius 0.05 cm, 654.40496 π cm (Rosa and Grover, NBS Scientific Paper 169)', () => {
    // The figure is Kirchhoff's formula, which leaves out ε² terms of 7e-7; one cm of inductance is 1 nH at µ0 = 4π × 10⁻⁷.
    const { inductance_H } = roundLoopInductance(loop(0.5, 0.001));
    const ratio = inductance_H / (654.40496401e-9 * Math.PI);
    expect(Math.abs(ratio - 1)).toBeLessThan(1e-6);
    const neglected = ((0.002 ** 2 / 8) * (Math.log(4000) + 1 / 3)) / (Math.log(4000) - 1.75);
    const permeability = VACUUM_PERMEABILITY_H_PER_M / (4e-7 * Math.PI);
    expect(Math.abs(ratio / permeability / (1 + neglected) - 1)).toBeLessThan(1e-10);
  });

  it('agrees with toroidal harmonics at 60 digits for every proportion', () => {
    for (const [ratio, expected] of harmonics as [number, number][]) {
      const { inductance_H } = roundLoopInductance(loop(0.2, 0.2 * ratio));
      expect(Math.abs(inductance_H / (0.1 * VACUUM_PERMEABILITY_H_PER_M) / expected - 1)).toBeLessThan(1e-14);
    }
  });

  it('states an error that covers a direct current’s own distribution, 1/r', () => {
    for (const [ratio, uniform, natural] of quadrature as [number, number, number][]) {
      const { relativeError } = roundLoopInductance(loop(1, ratio)).method;
      expect(relativeError).toBeGreaterThan(Math.abs(natural / uniform - 1));
      expect(relativeError).toBeLessThan(3 * Math.abs(natural / uniform - 1));
    }
  });

  it('bundles turns: N² times one, with an error that falls as 1/N', () => {
    const one = roundLoopInductance(loop(0.1, 0.005));
    const ten = roundLoopInductance({ ...loop(0.1, 0.005), turns: 10 });
    const thousand = roundLoopInductance({ ...loop(0.1, 0.005), turns: 1000 });
    expect(Math.abs(ten.inductance_H / one.inductance_H / 100 - 1)).toBeLessThan(1e-15);
    expect(ten.method.relativeError).toBeGreaterThan(0.01);
    expect(thousand.method.relativeError * 100).toBeCloseTo(ten.method.relativeError, 12);
  });

  it('scales with size', () => {
    const { inductance_H } = roundLoopInductance(loop(0.1, 0.03));
    for (const scale of [1e9, 1e-9]) {
      const scaled = roundLoopInductance(loop(0.1 * scale, 0.03 * scale)).inductance_H / scale;
      expect(Math.abs(scaled / inductance_H - 1)).toBeLessThan(2e-15);
    }
  });

  it('refuses wire as thick as the loop', () => {
    expect(() => roundLoopInductance(loop(0.01, 0.01))).toThrow(InvalidQuantity);
    expect(() => roundLoopInductance(loop(0.01, 0.01))).toThrow('/wireDiameter_m');
    expect(roundLoopInductance(loop(0.01, 0.00999999)).inductance_H).toBeGreaterThan(0);
  });
});
