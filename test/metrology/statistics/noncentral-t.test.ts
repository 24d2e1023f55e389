import { describe, expect, it } from 'vitest';
import {
  lowerTail,
  noncentralityLimit,
  upperTail,
  upperTailPoint,
} from '../../../src/metrology/statistics/noncentral-t.ts';
import reference from '../../fixtures/mpmath/noncentral-t.json' with { type: 'json' };

type Row = [t: number, nu: number, delta: number, lower: number, upper: number];
const rows = reference.noncentral as Row[];

describe('the noncentral t distribution', () => {
  it.each([...new Set(rows.map(([, nu]) => nu))])('both tails with %i degrees of freedom', (degrees) => {
    let worst = 0;
    for (const [t, nu, delta, lower, upper] of rows.filter(([, nu]) => nu === degrees)) {
      for (const [found, expected] of [
        [lowerTail(t, nu, delta), lower],
        [upperTail(t, nu, delta), upper],
      ] as const) {
        // t and δ as doubles leave this much of their difference in units of its spread, z times over in a tail.
        const spread = Math.sqrt(1 + (delta * delta) / (2 * nu));
        const condition = (1e-16 * (Math.abs(delta) + Math.abs(t)) * Math.sqrt(1 - 2 * Math.log(expected))) / spread;
        if (expected > 1e-290) worst = Math.max(worst, Math.abs(found / expected - 1) / (1e-12 + 4 * condition));
        else expect(found).toBeLessThan(1e-289);
      }
    }
    expect(worst).toBeLessThan(1);
  });

  it('quantiles and limits are found again from their probabilities', () => {
    let [compared, worst] = [0, 0];
    for (const [t, nu, delta, lower, upper] of rows) {
      const scale = Math.sqrt(1 + (delta * delta) / (2 * nu)) + Math.abs(t);
      // Near 1 a probability no longer tells where it came from.
      if (upper > 1e-12 && upper < 0.99)
        worst = Math.max(worst, Math.abs(upperTailPoint(upper, nu, delta) - t) / scale);
      if (lower > 1e-12 && lower < 0.99) {
        worst = Math.max(worst, Math.abs(noncentralityLimit(t, nu, lower) - delta) / scale);
        compared++;
      }
    }
    expect(compared).toBeGreaterThan(100);
    expect(worst).toBeLessThan(2e-13);
  });

  it('with δ = 0 is Student’s: one degree of freedom is Cauchy’s', () => {
    for (const t of [1e-6, 0.5, 1, 12.706204736, 1e6]) {
      expect(Math.abs(upperTail(t, 1, 0) / (Math.atan(1 / t) / Math.PI) - 1)).toBeLessThan(1e-13);
    }
  });

  it('at t = 0 is normal', () => {
    expect(lowerTail(0, 7, 1.959963984540054)).toBeCloseTo(0.025, 14);
  });
});
