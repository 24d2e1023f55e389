import { describe, expect, it } from 'vitest';
import { InvalidQuantity } from '../../../src/physics/invalid-quantity.ts';
import { alternatingResistanceRatio } from '../../../src/physics/losses/alternating-resistance.ts';
import { dowellRatio } from '../../../src/physics/losses/dowell.ts';
import { skinDepth_m } from '../../../src/physics/losses/skin-effect.ts';
import { conductorResistivity_ohm_m, type Winding } from '../../../src/physics/losses/winding-resistance.ts';
import rows from '../../fixtures/multipole/round-wire-rows.json' with { type: 'json' };

const d = 1e-3;
const wire: Winding = { turns: 1000, meanTurnLength_m: 0.1, wireDiameter_m: d };
/** The frequency at which 20 °C copper has a skin depth of `depth_m`. */
const frequencyFor = (depth_m: number) => (skinDepth_m(conductorResistivity_ohm_m('copper', 20), 1) / depth_m) ** 2;
const ratio = (winding: Winding, frequency: number) =>
  alternatingResistanceRatio(winding, frequency, 20).resistanceRatio;

describe('round wire alone', () => {
  it.each([
    [1, 1.0052, 1.5e-4],
    [5, 2.0427, 1.5e-4],
    [20, 7.328, 1.1e-3],
  ])('has the skin effect of NBS Circular 74 (1924), Table 17 at x = %d', (x, published, tolerance) => {
    const frequency = frequencyFor(d / (Math.SQRT2 * x));
    expect(Math.abs(ratio(wire, frequency) - published)).toBeLessThan(tolerance);
    expect(Math.abs(ratio({ ...wire, layers: 1, strands: 1 }, frequency) - published)).toBeLessThan(tolerance);
  });

  it('admits the proximity of turns that it was not told of: the exact field of one row lies within relativeError', () => {
    const single = (rows.rows as [number, number, number, boolean, number, number][]).filter((row) => row[4] === 1);
    expect(single.length).toBeGreaterThan(50);
    for (const [thickness, pitch, , , , exact] of single) {
      const { resistanceRatio, method } = alternatingResistanceRatio(wire, frequencyFor(d / thickness), 20);
      expect(exact, `d/δ = ${thickness}, pitch ${pitch} d`).toBeGreaterThan(resistanceRatio * (1 - 1e-6));
      expect(exact / resistanceRatio - 1).toBeLessThan(method.relativeError + 1e-9);
    }
  });

  it('claims little error for a single turn', () => {
    const { method } = alternatingResistanceRatio({ ...wire, turns: 1 }, 1e6, 20);
    expect(method.relativeError).toBeLessThan(0.04);
  });
});

describe('round wire in rows', () => {
  it('lies within relativeError of the exact field of such rows, solved by multipoles', () => {
    const all = rows.rows as [number, number, number, boolean, number, number][];
    expect(all.length).toBeGreaterThan(1000);
    for (const [thickness, pitch, apart, staggered, layers, exact] of all) {
      const { resistanceRatio, method } = alternatingResistanceRatio(
        { ...wire, layers, pitch_m: pitch * d },
        frequencyFor(d / thickness),
        20,
      );
      const error = Math.abs(exact - resistanceRatio) / resistanceRatio;
      const what = `d/δ ${thickness}, pitch ${pitch} d, rows ${apart} d apart, staggered ${staggered}, ${layers} layers`;
      expect(error, what).toBeLessThan(method.relativeError + 1e-9);
    }
  });

  it('is good to 6 % for tight windings up to two skin depths', () => {
    for (const [thickness, pitch, , , layers, exact] of rows.rows as [
      number,
      number,
      number,
      boolean,
      number,
      number,
    ][]) {
      if (thickness > 2 || pitch > 1.1) continue;
      const model = ratio({ ...wire, layers, pitch_m: pitch * d }, frequencyFor(d / thickness));
      expect(Math.abs(model / exact - 1)).toBeLessThan(0.06);
    }
  });

  it("is Dowell's ratio at (π/4)^¾·d/δ·√(d/pitch), touching where no pitch is given", () => {
    for (const pitch of [1, 1.2, 1.5]) {
      const delta = (Math.PI / 4) ** 0.75 * 1.7 * Math.sqrt(1 / pitch);
      const winding = { ...wire, layers: 4, ...(pitch > 1 && { pitch_m: pitch * d }) };
      expect(ratio(winding, frequencyFor(d / 1.7)) / dowellRatio(delta, 4)).toBeCloseTo(1, 12);
    }
  });

  it('leaves the skin effect where the neighbours go away', () => {
    const frequency = frequencyFor(d / 8);
    const far = ratio({ ...wire, pitch_m: 1e4 * d }, frequency);
    expect(far).toBe(ratio(wire, frequency));
    expect(ratio({ ...wire, pitch_m: 1.1 * d }, frequency)).toBeGreaterThan(far);
  });

  it('does not change when lengths go by s and frequency by 1/s²', () => {
    for (const s of [1e9, 1e-9]) {
      const scaled = { ...wire, wireDiameter_m: d * s, meanTurnLength_m: 0.1 * s, layers: 3, pitch_m: 1.2 * d * s };
      const unscaled = ratio({ ...wire, layers: 3, pitch_m: 1.2 * d }, 4e4);
      expect(ratio(scaled, 4e4 / (s * s)) / unscaled).toBeCloseTo(1, 12);
    }
  });
});

describe('strands', () => {
  it('are √n layers of strands to each layer', () => {
    const frequency = frequencyFor(1e-4 / 0.5);
    const litz = { ...wire, wireDiameter_m: 1e-4, strands: 100, layers: 2, pitch_m: 1.3e-3 };
    const asLayers = { ...wire, wireDiameter_m: 1e-4, layers: 20, pitch_m: 1.3e-4 };
    expect(ratio(litz, frequency) / ratio(asLayers, frequency)).toBeCloseTo(1, 13);
  });

  it('of the same copper lose less than one thick wire, until they are fine no longer', () => {
    const solid = { ...wire, layers: 2, pitch_m: 1.3e-3 };
    const litz = { ...wire, layers: 2, pitch_m: 1.3e-3, strands: 100, wireDiameter_m: 1e-4 };
    expect(ratio(litz, 1e5)).toBeLessThan(ratio(solid, 1e5) / 5);
    expect(ratio(litz, 1e8)).toBeGreaterThan(ratio(solid, 1e8));
  });

  it('have to fit side by side into their pitch', () => {
    const bundle = { ...wire, wireDiameter_m: 1e-4, strands: 100 };
    expect(() => ratio({ ...bundle, pitch_m: 0.9e-3 }, 1e5)).toThrow(InvalidQuantity);
    expect(() => ratio({ ...bundle, pitch_m: 0.9e-3 }, 1e5)).toThrow('/pitch_m');
    expect(ratio({ ...bundle, pitch_m: Math.sqrt(100) * 1e-4 }, 1e5)).toBeGreaterThan(1);
    expect(ratio({ ...bundle, strands: 7, pitch_m: Math.sqrt(7) * 1e-4 }, 1e5)).toBeGreaterThan(1);
  });
});

describe('foil', () => {
  const foil: Winding = { turns: 10, meanTurnLength_m: 0.1, foilThickness_m: 2e-4, foilWidth_m: 0.02, layers: 10 };

  it("is Dowell's ratio, porosity by width over pitch", () => {
    const frequency = frequencyFor(2e-4 / 0.9);
    expect(ratio(foil, frequency) / dowellRatio(0.9, 10)).toBeCloseTo(1, 12);
    expect(ratio({ ...foil, pitch_m: 0.025 }, frequency) / dowellRatio(0.9 * Math.sqrt(0.8), 10)).toBeCloseTo(1, 12);
  });

  it('admits more error the narrower it is against its window', () => {
    const error = (winding: Winding) => alternatingResistanceRatio(winding, 1e5, 20).method.relativeError;
    expect(error({ ...foil, pitch_m: 0.03 })).toBeGreaterThan(error(foil));
  });
});

describe('every winding', () => {
  it('has ratio 1 and no error at 0 Hz, and a finite ratio up to 1 THz', () => {
    const windings: Winding[] = [
      wire,
      { ...wire, layers: 5 },
      { ...wire, strands: 50 },
      { turns: 3, meanTurnLength_m: 1, foilThickness_m: 1e-3, foilWidth_m: 0.1 },
    ];
    for (const winding of windings) {
      const still = alternatingResistanceRatio(winding, 0, 20);
      expect(still.resistanceRatio).toBe(1);
      expect(still.method.relativeError).toBe(0);
      for (const frequency of [1e-9, 1, 1e6, 1e12]) {
        const { resistanceRatio, method } = alternatingResistanceRatio(winding, frequency, 20);
        expect(resistanceRatio).toBeGreaterThanOrEqual(1);
        expect(Number.isFinite(resistanceRatio)).toBe(true);
        expect(Number.isFinite(method.relativeError)).toBe(true);
      }
    }
  });

  it('has a loss per direct loss that falls with temperature, and a resistance that rises slower than the direct one', () => {
    for (const winding of [wire, { ...wire, layers: 5 }, { ...wire, strands: 50, wireDiameter_m: 3e-4 }]) {
      for (const frequency of [1e3, 1e5, 1e7]) {
        let previous = Number.POSITIVE_INFINITY;
        for (let t = -200; t < 1080; t += 20) {
          const { resistanceRatio } = alternatingResistanceRatio(winding, frequency, t);
          expect(resistanceRatio).toBeLessThanOrEqual(previous);
          previous = resistanceRatio;
        }
      }
    }
  });
});
