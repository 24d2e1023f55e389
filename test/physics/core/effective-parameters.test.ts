import { describe, expect, it } from 'vitest';
import { type CoreDimensions, effectiveParameters } from '../../../src/physics/core/effective-parameters.ts';
import fixture from '../../fixtures/mpmath/effective-parameters.json' with { type: 'json' };

const relative = (value: number, truth: number) => Math.abs(value / truth - 1);
const ring = (outerDiameter_m: number, innerDiameter_m: number, height_m: number): CoreDimensions => ({
  kind: 'ring',
  outerDiameter_m,
  innerDiameter_m,
  height_m,
});

describe('effectiveParameters against published values', () => {
  // IEC 60205's formula for rings, at ring sizes as in the tables of IEC 62317-12 (from memory): mm, mm², mm³.
  it.each([
    [25, 15, 10, 60.2, 48.9, 2944, 1.1],
    [10, 6, 4, 24.1, 7.83, 188, 0.5],
  ])('ring %d × %d × %d mm', (outer, inner, height, length, area, volume, volumeTolerance) => {
    const found = effectiveParameters(ring(outer * 1e-3, inner * 1e-3, height * 1e-3));
    expect(Math.abs(found.effectiveLength_m * 1e3 - length)).toBeLessThan(0.06);
    expect(Math.abs(found.effectiveArea_m2 * 1e6 - area)).toBeLessThan(0.051);
    expect(Math.abs(found.effectiveVolume_m3 * 1e9 - volume)).toBeLessThan(volumeTolerance);
  });

  it('E 42/21/15 pair: le 97 mm, Ae 178 mm², Ve 17 300 mm³ at its mean dimensions (size series of IEC 62317, from memory)', () => {
    const found = effectiveParameters({
      kind: 'E',
      width_m: 42.15e-3,
      height_m: 21e-3,
      depth_m: 14.95e-3,
      windowHeight_m: 15.1e-3,
      outerLegSpacing_m: 30.1e-3,
      centreLegWidth_m: 11.95e-3,
    });
    expect(relative(found.effectiveLength_m, 97e-3)).toBeLessThan(0.005);
    expect(relative(found.effectiveArea_m2, 178e-6)).toBeLessThan(0.005);
    expect(relative(found.effectiveVolume_m3, 17_300e-9)).toBeLessThan(0.005);
  });
});

describe('effectiveParameters against 60 digits (test/fixtures/mpmath)', () => {
  it.each(fixture.ring.rows)('ring %d, %d, %d m', (outer, inner, height, area, length) => {
    const found = effectiveParameters(ring(outer!, inner!, height!));
    expect(relative(found.effectiveArea_m2, area!)).toBeLessThan(1e-15);
    expect(relative(found.effectiveLength_m, length!)).toBeLessThan(1e-15);
    expect(found.minimumArea_m2).toBe(found.effectiveArea_m2);
  });

  it('E pairs', () => {
    for (const row of fixture.E.rows) {
      const [width_m, height_m, depth_m, windowHeight_m, outerLegSpacing_m, centreLegWidth_m, area, length] = row as [
        number,
        number,
        number,
        number,
        number,
        number,
        number,
        number,
      ];
      const found = effectiveParameters({
        kind: 'E',
        width_m,
        height_m,
        depth_m,
        windowHeight_m,
        outerLegSpacing_m,
        centreLegWidth_m,
      });
      expect(relative(found.effectiveArea_m2, area)).toBeLessThan(2e-14);
      expect(relative(found.effectiveLength_m, length)).toBeLessThan(2e-14);
      expect(found.minimumArea_m2).toBeLessThanOrEqual(found.effectiveArea_m2);
    }
  });

  it('U pairs', () => {
    for (const row of fixture.U.rows) {
      const [width_m, height_m, depth_m, windowHeight_m, windowWidth_m, area, length] = row as [
        number,
        number,
        number,
        number,
        number,
        number,
        number,
      ];
      const found = effectiveParameters({ kind: 'U', width_m, height_m, depth_m, windowHeight_m, windowWidth_m });
      expect(relative(found.effectiveArea_m2, area)).toBeLessThan(2e-14);
      expect(relative(found.effectiveLength_m, length)).toBeLessThan(2e-14);
    }
  });
});

describe('effectiveParameters', () => {
  it('of a thin ring are its section and mean circumference', () => {
    const found = effectiveParameters(ring(1 + 1e-6, 1, 0.02));
    expect(relative(found.effectiveArea_m2, 0.02 * 0.5e-6)).toBeLessThan(1e-9);
    expect(relative(found.effectiveLength_m, Math.PI * (1 + 0.5e-6))).toBeLessThan(1e-12);
  });

  it('of a core of one section everywhere are that section', () => {
    const { effectiveArea_m2, minimumArea_m2 } = effectiveParameters({
      kind: 'U',
      width_m: 0.04,
      height_m: 0.03,
      depth_m: 0.01,
      windowHeight_m: 0.02,
      windowWidth_m: 0.02,
    });
    expect(relative(effectiveArea_m2, 1e-4)).toBeLessThan(1e-14);
    expect(relative(minimumArea_m2, 1e-4)).toBeLessThan(1e-14);
  });

  it('scale as length and area', () => {
    const core = {
      kind: 'E',
      width_m: 4,
      height_m: 2,
      depth_m: 1.5,
      windowHeight_m: 1.4,
      outerLegSpacing_m: 3,
      centreLegWidth_m: 1.2,
    } as const;
    const base = effectiveParameters(core);
    for (const s of [1e-9, 1e9]) {
      const scaled = effectiveParameters({
        kind: 'E',
        width_m: 4 * s,
        height_m: 2 * s,
        depth_m: 1.5 * s,
        windowHeight_m: 1.4 * s,
        outerLegSpacing_m: 3 * s,
        centreLegWidth_m: 1.2 * s,
      });
      expect(relative(scaled.effectiveLength_m, base.effectiveLength_m * s)).toBeLessThan(1e-13);
      expect(relative(scaled.effectiveArea_m2, base.effectiveArea_m2 * s * s)).toBeLessThan(1e-13);
    }
  });

  const e = {
    kind: 'E',
    width_m: 42,
    height_m: 21,
    depth_m: 15,
    windowHeight_m: 15,
    outerLegSpacing_m: 30,
    centreLegWidth_m: 12,
  } as const;
  const u = { kind: 'U', width_m: 40, height_m: 30, depth_m: 10, windowHeight_m: 20, windowWidth_m: 20 } as const;
  const refused: [string, CoreDimensions, string][] = [
    ['a hole as wide as the ring', ring(0.01, 0.01, 0.01), '/innerDiameter_m'],
    ['an E without back', { ...e, windowHeight_m: 21 }, '/windowHeight_m'],
    ['an E without outer legs', { ...e, outerLegSpacing_m: 42 }, '/outerLegSpacing_m'],
    ['an E without window', { ...e, centreLegWidth_m: 30 }, '/centreLegWidth_m'],
    ['a U without back', { ...u, windowHeight_m: 31 }, '/windowHeight_m'],
    ['a U without legs', { ...u, windowWidth_m: 40 }, '/windowWidth_m'],
  ];
  it.each(refused)('refuses %s', (_, dimensions, pointer) => {
    expect(() => effectiveParameters(dimensions)).toThrow(
      expect.objectContaining({ name: 'InvalidQuantity', pointer }),
    );
  });
});
