import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  fivePointSlopes,
  harmonicSlopes,
  hermite,
  limitSlopes,
} from '../../../src/physics/numerics/monotone-interpolation.ts';
import fixture from '../../fixtures/scipy/pchip.json' with { type: 'json' };

const SEED = 20_260;

describe.each(fixture.tables)('against scipy’s PCHIP: $name', ({ x, y, slopes, points }) => {
  it('the slopes agree', () => {
    const scale = Math.max(...slopes.map(Math.abs));
    harmonicSlopes(x, y).forEach((slope, k) => {
      expect(Math.abs(slope - slopes[k]!)).toBeLessThan(1e-15 * scale + 1e-14 * Math.abs(slopes[k]!));
    });
  });

  it('value, slope and the three integrals agree with 50 digits', () => {
    const curve = hermite(x, y, slopes);
    const largest = Math.max(...x.map(Math.abs), 1);
    for (const [at, value, slope, integral, moment, stieltjes] of points as [
      number,
      number,
      number,
      number,
      number,
      number,
    ][]) {
      const near = (found: number, truth: number, scale: number) =>
        expect(Math.abs(found - truth)).toBeLessThanOrEqual(3e-15 * scale + 2e-14 * Math.abs(truth));
      const high = Math.max(...y.map(Math.abs));
      near(curve.value(at), value, 0);
      near(curve.slope(at), slope, 1e-3 * Math.max(...slopes.map(Math.abs)));
      near(curve.integral(at), integral, x[0]! < 0 ? high * largest : 0);
      near(curve.moment(at), moment, x[0]! < 0 ? high * largest ** 2 : 0);
      near(curve.stieltjes(at), stieltjes, x[0]! < 0 ? high * largest : 0);
    }
  });
});

describe('fivePointSlopes', () => {
  const x = [0, 0.3, 1, 1.2, 2, 3.5, 4, 5];

  it('is exact for a rising quartic wherever the limiter lets it', () => {
    const rising = (at: number) => 2 + 9 * at + 0.5 * at ** 2 - 0.3 * at ** 3 + 0.06 * at ** 4;
    const slope = (at: number) => 9 + at - 0.9 * at ** 2 + 0.24 * at ** 3;
    fivePointSlopes(x, x.map(rising)).forEach((found, k) => {
      expect(Math.abs(found / slope(x[k]!) - 1)).toBeLessThan(1e-13);
    });
  });

  it('converges in fourth order on a smooth curve', () => {
    const error = (n: number) => {
      const nodes = Array.from({ length: n + 1 }, (_, k) => k / n);
      const curve = hermite(nodes, nodes.map(Math.exp), fivePointSlopes(nodes, nodes.map(Math.exp)));
      return Math.max(...Array.from({ length: 501 }, (_, k) => Math.abs(curve.value(k / 500) - Math.exp(k / 500))));
    };
    expect(error(16) / error(32)).toBeGreaterThan(14);
    expect(error(32)).toBeLessThan(1e-7);
  });

  it('two, three and four points give the line, parabola and cubic through them', () => {
    expect(fivePointSlopes([0, 2], [1, 5])).toEqual([2, 2]);
    const square = [1, 2, 4];
    expect(
      fivePointSlopes(
        square,
        square.map((at) => at ** 2),
      ),
    ).toEqual([2, 4, 8]);
    const four = [1, 2, 3, 5];
    fivePointSlopes(
      four,
      four.map((at) => at ** 3),
    ).forEach((slope, k) => {
      expect(Math.abs(slope / (3 * four[k]! ** 2) - 1)).toBeLessThan(1e-14);
    });
  });
});

describe('properties of both slopes, random data', () => {
  const data = fc
    .array(fc.tuple(fc.double({ min: 1e-3, max: 1e3, noNaN: true }), fc.double({ min: -5, max: 5, noNaN: true })), {
      minLength: 2,
      maxLength: 12,
    })
    .map((steps) => {
      let at = 0;
      const x = steps.map(([step]) => {
        at += step;
        return at;
      });
      return { x, y: steps.map(([, value]) => value) };
    });

  it.each([
    ['harmonic', harmonicSlopes],
    ['five-point', fivePointSlopes],
  ])('%s: passes through the points and never overshoots between them', (_, slopesOf) => {
    fc.assert(
      fc.property(data, fc.double({ min: 0, max: 1, noNaN: true }), ({ x, y }, t) => {
        const curve = hermite(x, y, slopesOf(x, y));
        const scale = Math.max(...y.map(Math.abs));
        for (let k = 0; k + 1 < x.length; k++) {
          const value = curve.value(x[k]! + t * (x[k + 1]! - x[k]!));
          expect(value).toBeGreaterThanOrEqual(Math.min(y[k]!, y[k + 1]!) - 1e-12 * scale);
          expect(value).toBeLessThanOrEqual(Math.max(y[k]!, y[k + 1]!) + 1e-12 * scale);
          expect(Math.abs(curve.value(x[k]!) - y[k]!)).toBe(0);
        }
      }),
      { seed: SEED, numRuns: 200 },
    );
  });

  it('the slope is monotone between its turns', () => {
    fc.assert(
      fc.property(data, ({ x, y }) => {
        const curve = hermite(x, y, fivePointSlopes(x, y));
        const turns = curve.slopeTurns();
        expect(turns[0]).toBe(x[0]);
        expect(turns.at(-1)).toBe(x.at(-1));
        const noise = 1e-9 * Math.max(...turns.map((at) => Math.abs(curve.slope(at))));
        for (let k = 0; k + 1 < turns.length; k++) {
          const samples = [0, 0.25, 0.5, 0.75, 1 - 1e-9].map((t) =>
            curve.slope(turns[k]! + t * (turns[k + 1]! - turns[k]!)),
          );
          const steps = samples.slice(1).map((value, n) => value - samples[n]!);
          expect(steps.every((step) => step >= -noise) || steps.every((step) => step <= noise)).toBe(true);
        }
      }),
      { seed: SEED, numRuns: 200 },
    );
  });

  it('∫ x dy = x·y − ∫ y dx', () => {
    fc.assert(
      fc.property(data, fc.double({ min: 0, max: 1, noNaN: true }), ({ x, y }, t) => {
        const curve = hermite(x, y, harmonicSlopes(x, y));
        const at = x[0]! + t * (x.at(-1)! - x[0]!);
        const parts = at * curve.value(at) - x[0]! * y[0]! - curve.integral(at);
        const scale = at * Math.max(...y.map(Math.abs));
        expect(Math.abs(curve.stieltjes(at) - parts)).toBeLessThanOrEqual(1e-12 * scale);
      }),
      { seed: SEED, numRuns: 200 },
    );
  });

  it('limits to the sign and a multiple of the flatter neighbouring secant', () => {
    expect(limitSlopes([0, 1, 2], [0, 1, 3], [-1, 9, 4])).toEqual([0, 3, 4]);
    expect(limitSlopes([0, 1, 2], [0, -1, -3], [1, -9, -4], 2)).toEqual([0, -2, -4]);
    expect(limitSlopes([0, 1, 2], [0, 1, 0], [1, 1, -1])).toEqual([1, 0, -1]);
  });
});
