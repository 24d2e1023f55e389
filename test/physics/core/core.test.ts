import { describe, expect, it } from 'vitest';
import { type Core, coreParameters } from '../../../src/physics/core/core.ts';

const material = { initialPermeability: 2000 };
const dimensions = { kind: 'ring', outerDiameter_m: 0.025, innerDiameter_m: 0.015, height_m: 0.01 } as const;

describe('coreParameters', () => {
  it('takes effective parameters as given, the smallest section being the effective one unless stated', () => {
    const given = coreParameters({ effectiveArea_m2: 1e-4, effectiveLength_m: 0.1, material });
    expect(given).toEqual({
      effectiveArea_m2: 1e-4,
      effectiveLength_m: 0.1,
      effectiveVolume_m3: 1e-5,
      minimumArea_m2: 1e-4,
    });
    const narrow = coreParameters({ effectiveArea_m2: 1e-4, effectiveLength_m: 0.1, minimumArea_m2: 9e-5, material });
    expect(narrow.minimumArea_m2).toBe(9e-5);
  });

  it('computes them from dimensions', () => {
    expect(coreParameters({ dimensions, material }).effectiveLength_m).toBeCloseTo(0.06018, 5);
  });

  const refused: [string, Core, string][] = [
    ['neither parameters nor dimensions', { material }, '/effectiveArea_m2'],
    ['an area without length', { effectiveArea_m2: 1e-4, material }, '/effectiveLength_m'],
    ['both', { dimensions, effectiveLength_m: 0.1, material }, '/effectiveLength_m'],
    ['dimensions and a smallest section', { dimensions, minimumArea_m2: 1e-5, material }, '/minimumArea_m2'],
    [
      'a smallest section above the effective area',
      { effectiveArea_m2: 1e-4, effectiveLength_m: 0.1, minimumArea_m2: 1.2e-4, material },
      '/minimumArea_m2',
    ],
    [
      'impossible dimensions',
      { dimensions: { ...dimensions, innerDiameter_m: 0.03 }, material },
      '/dimensions/innerDiameter_m',
    ],
  ];
  it.each(refused)('refuses %s', (_, core, pointer) => {
    expect(() => coreParameters(core)).toThrow(expect.objectContaining({ name: 'InvalidQuantity', pointer }));
  });
});
