import { describe, expect, it } from 'vitest';
import { type Gap, gapInCircuit } from '../../../src/physics/core/gap.ts';
import { InvalidQuantity } from '../../../src/physics/invalid-quantity.ts';
import fixture from '../../fixtures/finite-element/gap-permeance.json' with { type: 'json' };

const AREA = 1.8e-4;
const LENGTH = 0.1;
const of = (gap: Gap) => gapInCircuit(gap, AREA, LENGTH);

describe('gapInCircuit', () => {
  it('adds the gap to the width and depth, or the diameter, of the leg where one is given', () => {
    const rectangular = of({ length_m: 1e-3, legWidth_m: 12e-3, legDepth_m: 15e-3 });
    expect(rectangular.fringing).toBe('expanded-area');
    expect(rectangular.area_m2).toBeCloseTo(13e-3 * 16e-3, 15);
    const round = of({ length_m: 1e-3, legDiameter_m: 11e-3 });
    expect(round.area_m2).toBeCloseTo((Math.PI / 4) * 12e-3 ** 2, 15);
  });

  it('takes the effective area, the leg or the known area as it is where nothing is to be added', () => {
    expect(of({ length_m: 1e-3 })).toMatchObject({ area_m2: AREA, fringing: 'none' });
    expect(of({ length_m: 1e-3, area_m2: 2e-4 })).toMatchObject({ area_m2: 2e-4, fringing: 'none', relativeError: 0 });
    const leg = of({ length_m: 1e-3, legWidth_m: 12e-3, legDepth_m: 15e-3, fringing: 'none' });
    expect(leg.area_m2).toBeCloseTo(1.8e-4, 18);
  });

  it('adds equal gaps in series', () => {
    expect(of({ length_m: 0.25e-3, count: 4 }).length_m).toBeCloseTo(1e-3, 18);
  });

  describe('against finite-element fields of a gapped leg in its window (test/fixtures/finite-element)', () => {
    const cases = fixture.rows.map((row) => {
      const [gap, outer, half, , permeance] = row as [number, number, number, number[], number];
      return { gap, outer, half, measured_m2: permeance * gap, aspect: (outer - 1) / (2 * half) };
    });
    const within = cases.filter(({ aspect }) => aspect > 0.12);

    it('covers what it is said to cover', () => {
      expect(cases.length).toBeGreaterThan(60);
      expect(within.length).toBeGreaterThan(0.8 * cases.length);
    });

    it.each(['expanded-area', 'conformal-map', 'none'] as const)('%s is within the error it states', (fringing) => {
      for (const { gap, half, measured_m2 } of within) {
        const leg = { length_m: gap, legDiameter_m: 2, fringing };
        const answer = gapInCircuit(
          fringing === 'conformal-map' ? { ...leg, legLength_m: half - gap / 2 } : leg,
          Math.PI,
          100,
        );
        expect(Math.abs(measured_m2 / answer.area_m2 - 1)).toBeLessThanOrEqual(answer.relativeError);
      }
    });

    it('conformal map: within 0.4 % for gaps of a quarter per cent of the diameter', () => {
      const fine = within.filter(({ gap }) => gap === 0.005);
      for (const { gap, half, measured_m2 } of fine) {
        const answer = gapInCircuit(
          { length_m: gap, legDiameter_m: 2, legLength_m: half - gap / 2, fringing: 'conformal-map' },
          Math.PI,
          100,
        );
        expect(Math.abs(measured_m2 / answer.area_m2 - 1)).toBeLessThan(0.004);
      }
    });
  });

  it('states a model error that grows with the gap, and vanishes with it', () => {
    const errors = [0, 1e-6, 1e-5, 1e-4, 1e-3, 3e-3].map(
      (length_m) => of({ length_m, legWidth_m: 12e-3, legDepth_m: 15e-3 }).relativeError,
    );
    expect(errors[0]).toBe(0);
    for (let k = 1; k < errors.length; k++) expect(errors[k]!).toBeGreaterThan(errors[k - 1]!);
    expect(errors[1]!).toBeLessThan(2e-3);
  });

  const refused: [string, Gap, string][] = [
    ['longer than the path', { length_m: 0.1 }, '/length_m'],
    ['many gaps longer than the path', { length_m: 0.03, count: 4 }, '/length_m'],
    ['no whole number of gaps', { length_m: 1e-3, count: 1.5 }, '/count'],
    ['width without depth', { length_m: 1e-3, legWidth_m: 1e-2 }, '/legDepth_m'],
    ['depth without width', { length_m: 1e-3, legDepth_m: 1e-2 }, '/legWidth_m'],
    [
      'round and rectangular',
      { length_m: 1e-3, legDepth_m: 1e-2, legWidth_m: 1e-2, legDiameter_m: 1e-2 },
      '/legDiameter_m',
    ],
    ['known area and a leg', { length_m: 1e-3, legDiameter_m: 1e-2, area_m2: 1e-4 }, '/area_m2'],
    ['known area and fringing', { length_m: 1e-3, area_m2: 1e-4, fringing: 'expanded-area' }, '/fringing'],
    ['fringing without a leg', { length_m: 1e-3, fringing: 'expanded-area' }, '/fringing'],
    [
      'map without the leg’s length',
      { length_m: 1e-3, legDiameter_m: 1e-2, fringing: 'conformal-map' },
      '/legLength_m',
    ],
    [
      'map of a stub',
      { length_m: 1e-3, legDiameter_m: 1e-2, legLength_m: 6e-4, fringing: 'conformal-map' },
      '/legLength_m',
    ],
    ['leg length that nothing uses', { length_m: 1e-3, legDiameter_m: 1e-2, legLength_m: 1e-2 }, '/legLength_m'],
    ['leg length beside a known area', { length_m: 1e-3, area_m2: 1e-4, legLength_m: 1e-2 }, '/legLength_m'],
  ];
  it.each(refused)('refuses %s', (_, gap, pointer) => {
    expect(() => of(gap)).toThrow(InvalidQuantity);
    expect(() => of(gap)).toThrow(expect.objectContaining({ pointer }));
  });
});
