import { describe, expect, it } from 'vitest';
import { derivatives } from '../../src/metrology/derivative.ts';

interface Known {
  readonly f: (x: number) => number;
  readonly slope: (x: number) => number;
}

const FUNCTIONS: Record<string, Known> = {
  exp: { f: Math.exp, slope: Math.exp },
  ln: { f: Math.log, slope: (x) => 1 / x },
  sqrt: { f: Math.sqrt, slope: (x) => 0.5 / Math.sqrt(x) },
  reciprocal: { f: (x) => 1 / x, slope: (x) => -1 / (x * x) },
  power: { f: (x) => x ** 10, slope: (x) => 10 * x ** 9 },
  pole: { f: (x) => 1 / (1 - x), slope: (x) => 1 / (1 - x) ** 2 },
  bell: { f: (x) => Math.exp(-x * x), slope: (x) => -2 * x * Math.exp(-x * x) },
  line: { f: (x) => 3 * x + 7, slope: () => 3 },
};

function slopeOf(f: (x: number) => number, x: number, scale: number, side: 'both' | 'right' | 'left' = 'both') {
  const along = (at: number) => {
    const outside = (side === 'right' && at < x) || (side === 'left' && at > x);
    const y = f(at);
    return outside || !Number.isFinite(y) ? null : [y];
  };
  return derivatives(along, x, [f(x)], { step: Math.abs(x) / 8, scale })!;
}

describe('derivatives', () => {
  it.each([
    ['both', 'central', 1e-11, 100],
    ['right', 'forward', 1e-10, 1000],
    ['left', 'backward', 1e-10, 1000],
  ] as const)(
    'of known functions from %s side(s), beyond what rounding of f and x leaves',
    (side, scheme, tolerance, roundings) => {
      let compared = 0;
      for (const [name, { f, slope }] of Object.entries(FUNCTIONS)) {
        for (let exponent = -9; exponent <= 9; exponent += 0.37) {
          for (const x of [10 ** exponent, -(10 ** exponent)]) {
            const exact = slope(x);
            if (!Number.isFinite(f(x)) || !(Math.abs(exact) > 1e-250) || !Number.isFinite(exact)) continue;
            for (const scale of [1e-2, 1e-4, 1e-8]) {
              const found = slopeOf(f, x, scale * Math.abs(x), side);
              const rounding = roundings * Number.EPSILON * (Math.abs(f(x) / x) + Math.abs(exact));
              const where = `${name} at ${x}, scale ${scale}`;
              expect(found.scheme).toBe(scheme);
              expect(Math.abs(found.values[0]! - exact), where).toBeLessThan(tolerance * Math.abs(exact) + rounding);
              compared++;
            }
          }
        }
      }
      expect(compared).toBeGreaterThan(1500);
    },
  );

  it('look past a bend, a step of a table and a steep place near the point', () => {
    const bent = (x: number) => (x < 1.001 ? x : 1.001 + 2 * (x - 1.001));
    expect(slopeOf(bent, 1, 1e-5).values[0]).toBeCloseTo(1, 9);
    expect(slopeOf(bent, 1.0015, 1e-5).values[0]).toBeCloseTo(2, 9);
    const steep = (x: number) => Math.tanh(1e4 * (x - 1));
    const exact = 1e4 / Math.cosh(0.5) ** 2;
    expect(Math.abs(slopeOf(steep, 1.00005, 1e-6).values[0]! / exact - 1)).toBeLessThan(1e-9);
  });

  it('are those over the uncertainty where the function swings faster than its argument suggests', () => {
    for (const x of [2e4, 1e6, 1e8]) {
      const found = slopeOf(Math.sin, x, 1e-3).values[0]!;
      expect(Math.abs(found - Math.cos(x))).toBeLessThan(1e-5);
    }
  });

  it('of every component at once', () => {
    const f = (x: number) => [x, x ** 2, 1, Math.sin(x)];
    const { values } = derivatives(f, 2, f(2), { step: 0.25, scale: 0.1 })!;
    expect(values[0]).toBeCloseTo(1, 12);
    expect(values[1]).toBeCloseTo(4, 12);
    expect(values[2]).toBe(0);
    expect(values[3]).toBeCloseTo(Math.cos(2), 12);
  });

  it('are not there where the function has no neighbouring value', () => {
    expect(derivatives((x) => (x === 2 ? [1] : null), 2, [1], { step: 0.25, scale: 0.1 })).toBeNull();
  });
});
