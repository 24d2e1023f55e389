import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type ConformityRequest, conformity, type RuleKind } from '../../src/metrology/conformity.ts';
import { InvalidQuantity } from '../../src/physics/invalid-quantity.ts';
import reference from '../fixtures/mpmath/conformity.json' with { type: 'json' };

const KINDS: readonly RuleKind[] = ['simple-acceptance', 'guarded-acceptance', 'guarded-rejection', 'three-zone'];

function limits(lower: number | null, upper: number | null) {
  return { ...(lower === null ? {} : { lower }), ...(upper === null ? {} : { upper }) };
}

describe('published examples', () => {
  it('JCGM 106:2012 clause 7, Zener breakdown voltage: P = 0.92', () => {
    const { conformanceProbability } = conformity({ measured: -5.47, standardUncertainty: 0.05, upper: -5.4 });
    expect(conformanceProbability).toBeCloseTo(0.92, 2);
    expect(conformanceProbability).toBeCloseTo(0.9192433, 7);
  });

  it.each([
    [0.8, 0.84, 0.842],
    [0.9, 1.28, 1.282],
    [0.95, 1.64, 1.645],
    [0.99, 2.33, 2.326],
    [0.999, 3.09, 3.09],
  ])(
    'JCGM 106:2012 Table 1: conformance probability %f needs %f u to a single limit',
    (probability, printed, exact) => {
      const rule = { kind: 'guarded-acceptance', risk: 1 - probability } as const;
      const { acceptance } = conformity({ measured: 0, standardUncertainty: 1, lower: 0, rule });
      expect(Math.abs(acceptance!.lower! - printed)).toBeLessThan(0.006);
      expect(acceptance!.lower!).toBeCloseTo(exact, 3);
    },
  );

  it('ILAC-G8:09/2019: specific risk at the acceptance limit below 2.5 % with a guard band of U (k = 2), 50 % with none', () => {
    const guarded = conformity({ measured: 10 - 2 * 0.3, standardUncertainty: 0.3, upper: 10 });
    expect(guarded.nonconformanceProbability).toBeLessThan(0.025);
    expect(guarded.nonconformanceProbability).toBeCloseTo(0.02275013, 8);
    expect(conformity({ measured: 10, standardUncertainty: 0.3, upper: 10 }).nonconformanceProbability).toBe(0.5);
  });

  it('ISO 14253-1:2017 default rule: guard band of 0.83 U (k = 2) for 95 %', () => {
    const { acceptance } = conformity({ measured: 0, standardUncertainty: 0.5, upper: 100 });
    expect(100 - acceptance!.upper!).toBeCloseTo(0.8224268, 7);
    expect(Math.abs(100 - acceptance!.upper! - 0.83)).toBeLessThan(0.01);
  });
});

describe('against mpmath', () => {
  it('probabilities of conformance and nonconformance to 3e-13, down to 1e-300', () => {
    let compared = 0;
    for (const row of reference.probabilities) {
      const { measured, standardUncertainty } = row;
      const found = conformity({ measured, standardUncertainty, ...limits(row.lower, row.upper) });
      for (const [value, exact] of [
        [found.conformanceProbability, row.conforming],
        [found.nonconformanceProbability, row.nonconforming],
      ] as const) {
        if (exact > 1e-300) {
          expect(Math.abs(value / exact - 1), JSON.stringify(row)).toBeLessThan(3e-13);
          compared++;
        } else expect(value).toBeLessThan(1.001e-300);
      }
    }
    expect(compared).toBeGreaterThan(1500);
  });

  it('guard bands between two limits to 1e-14', () => {
    for (const { risk, width, acceptance, rejection } of reference.bands) {
      const request = { measured: 0, standardUncertainty: 1, lower: 0, upper: width };
      for (const [kind, band] of [
        ['guarded-acceptance', acceptance],
        ['three-zone', acceptance],
        ['guarded-rejection', rejection === null ? null : -rejection],
      ] as const) {
        const interval = conformity({ ...request, rule: { kind, risk } }).acceptance;
        const where = `${kind}, risk ${risk}, width ${width}`;
        if (band === null) expect(interval, where).toBeNull();
        else {
          expect(Math.abs(interval!.lower! - band), where).toBeLessThan(1e-14 * Math.max(1, Math.abs(band)));
          expect(Math.abs(width - interval!.upper! - band), where).toBeLessThan(1e-14 * Math.max(1, width));
        }
      }
    }
  });
});

describe('rules', () => {
  const at = (measured: number, kind: RuleKind, risk = 0.05) =>
    conformity({ measured, standardUncertainty: 1, lower: 0, upper: 20, rule: { kind, risk } }).outcome;

  it('differ in the guard bands only', () => {
    const outcomes = (measured: number) => KINDS.map((kind) => at(measured, kind));
    expect(outcomes(10)).toEqual(['pass', 'pass', 'pass', 'pass']);
    expect(outcomes(1)).toEqual(['pass', 'fail', 'pass', 'inconclusive']);
    expect(outcomes(-1)).toEqual(['fail', 'fail', 'pass', 'inconclusive']);
    expect(outcomes(-2)).toEqual(['fail', 'fail', 'fail', 'fail']);
  });

  it('default to three zones with a risk of 0.05', () => {
    const request = { standardUncertainty: 1, lower: 0, upper: 20 };
    for (const measured of [-2, -1.6, 0, 1.6, 2, 10]) {
      expect(conformity({ measured, ...request })).toEqual(
        conformity({ measured, ...request, rule: { kind: 'three-zone', risk: 0.05 } }),
      );
    }
  });

  it('leave nothing inconclusive at a risk of 0.5, where a value on the only limit passes', () => {
    for (const measured of [-3, -1e-9, 0, 1e-9, 3]) {
      const decide = (kind: RuleKind) =>
        conformity({ measured, standardUncertainty: 1, lower: 0, rule: { kind, risk: 0.5 } }).outcome;
      expect(decide('three-zone')).toBe(measured >= 0 ? 'pass' : 'fail');
      expect(decide('guarded-acceptance')).toBe(measured >= 0 ? 'pass' : 'fail');
      expect(decide('guarded-rejection')).toBe(measured > 0 ? 'pass' : 'fail');
    }
  });

  it('decide exactly where the uncertainty is zero; a value on a limit conforms', () => {
    for (const kind of KINDS) {
      for (const [measured, inside] of [
        [1, true],
        [2, true],
        [1 - 2 ** -53, false],
        [2 + 2 ** -51, false],
      ] as const) {
        const found = conformity({ measured, standardUncertainty: 0, lower: 1, upper: 2, rule: { kind } });
        expect(found.outcome).toBe(inside ? 'pass' : 'fail');
        expect(found.conformanceProbability).toBe(inside ? 1 : 0);
        expect(found.nonconformanceProbability).toBe(inside ? 0 : 1);
        expect(found.acceptance).toEqual({ lower: 1, upper: 2 });
        expect(found.normalisedMargin).toBeNull();
      }
    }
  });

  it('keep both tails apart from 0 and 1', () => {
    const far = conformity({ measured: 30, standardUncertainty: 1, lower: 0 });
    expect(far.conformanceProbability).toBe(1);
    // P(Z > 30) = 4.906 713 927 148 187e-198, mpmath
    expect(Math.abs(far.nonconformanceProbability / 4.906713927148187e-198 - 1)).toBeLessThan(2e-13);
  });
});

describe('margin', () => {
  it('is the signed distance to the nearest limit', () => {
    const margin = (measured: number, lower: number | null, upper: number | null) =>
      conformity({ measured, standardUncertainty: 0.5, ...limits(lower, upper) });
    expect(margin(3, 1, 10)).toMatchObject({ margin: 2, normalisedMargin: 4 });
    expect(margin(9, 1, 10)).toMatchObject({ margin: 1, normalisedMargin: 2 });
    expect(margin(12, 1, 10)).toMatchObject({ margin: -2, normalisedMargin: -4 });
    expect(margin(3, null, 10)).toMatchObject({ margin: 7, normalisedMargin: 14 });
    expect(margin(10, null, 10)).toMatchObject({ margin: 0, normalisedMargin: 0 });
  });
});

describe('properties', () => {
  const magnitude = fc.oneof(
    fc.double({ min: -1e3, max: 1e3, noNaN: true }),
    fc.double({ noNaN: true, noDefaultInfinity: true }),
  );
  const uncertainty = fc.oneof(
    fc.double({ min: 0, max: 1e3, noNaN: true }),
    fc.double({ min: 0, noNaN: true, noDefaultInfinity: true }),
    fc.constantFrom(0, 5e-324, 1e-300, 1e300, Number.MAX_VALUE),
  );
  const request = fc
    .record({
      measured: magnitude,
      standardUncertainty: uncertainty,
      a: magnitude,
      b: magnitude,
      sides: fc.constantFrom('lower', 'upper', 'both'),
      kind: fc.constantFrom(...KINDS),
      risk: fc.oneof(fc.constantFrom(0.05, 0.5, 1e-300), fc.double({ min: 1e-12, max: 0.5, noNaN: true })),
    })
    .map(
      ({ measured, standardUncertainty, a, b, sides, kind, risk }): ConformityRequest => ({
        measured,
        standardUncertainty,
        ...(sides === 'upper' ? {} : { lower: Math.min(a, b) }),
        ...(sides === 'lower' ? {} : { upper: Math.max(a, b) }),
        rule: { kind, risk },
      }),
    );

  it('every number is finite, probabilities lie in [0, 1] and add up to 1', () => {
    fc.assert(
      fc.property(request, (r) => {
        const found = conformity(r);
        const { conformanceProbability: p, nonconformanceProbability: q } = found;
        const numbers = [p, q, found.margin, found.normalisedMargin ?? 0];
        expect(numbers.every(Number.isFinite)).toBe(true);
        expect(p >= 0 && p <= 1 && q >= 0 && q <= 1).toBe(true);
        expect(Math.abs(p + q - 1)).toBeLessThan(1e-14);
      }),
      { seed: 106, numRuns: 2000 },
    );
  });

  it('acceptance limits pass when measured, and values a little beyond them do not', () => {
    fc.assert(
      fc.property(request, (r) => {
        const { acceptance, outcome } = conformity(r);
        if (acceptance === null) {
          expect(outcome).not.toBe('pass');
          return;
        }
        const scale = Math.max(...[r.lower, r.upper, 40 * r.standardUncertainty].map((x) => Math.abs(x ?? 0)));
        const tolerance = 1e-12 * scale + 64 * Number.MIN_VALUE;
        for (const [bound, outward, limit] of [
          [acceptance.lower, -1, r.lower],
          [acceptance.upper, 1, r.upper],
        ] as const) {
          expect(bound === null).toBe(limit === undefined);
          if (bound === null) continue;
          expect(conformity({ ...r, measured: bound }).outcome).toBe('pass');
          const beyond = bound + outward * tolerance;
          if (Number.isFinite(beyond) && Math.abs(bound) < Number.MAX_VALUE) {
            expect(conformity({ ...r, measured: beyond }).outcome).not.toBe('pass');
          }
        }
        if (acceptance.lower !== null && r.measured < acceptance.lower - tolerance) expect(outcome).not.toBe('pass');
        if (acceptance.upper !== null && r.measured > acceptance.upper + tolerance) expect(outcome).not.toBe('pass');
      }),
      { seed: 107, numRuns: 2000 },
    );
  });

  it('decisions do not depend on the unit', () => {
    const ordinary = fc.double({ min: -10, max: 10, noNaN: true, noDefaultInfinity: true });
    fc.assert(
      fc.property(ordinary, ordinary, fc.double({ min: 0.01, max: 10, noNaN: true }), (measured, limit, u) => {
        for (const unit of [2 ** -30, 2 ** 30]) {
          const plain = conformity({ measured, standardUncertainty: u, lower: limit, upper: limit + 3 });
          const scaled = conformity({
            measured: measured * unit,
            standardUncertainty: u * unit,
            lower: limit * unit,
            upper: (limit + 3) * unit,
          });
          expect(scaled.conformanceProbability).toBe(plain.conformanceProbability);
          expect(scaled.outcome).toBe(plain.outcome);
        }
      }),
      { seed: 108, numRuns: 500 },
    );
  });
});

describe('refuses', () => {
  it.each<[string, ConformityRequest]>([
    ['/lower', { measured: 1, standardUncertainty: 1 }],
    ['/lower', { measured: 1, standardUncertainty: 1, lower: 2, upper: 1 }],
    ['/lower', { measured: 1, standardUncertainty: 1, lower: Number.NaN }],
    ['/upper', { measured: 1, standardUncertainty: 1, upper: Number.POSITIVE_INFINITY }],
    ['/measured', { measured: Number.NaN, standardUncertainty: 1, lower: 0 }],
    ['/standardUncertainty', { measured: 1, standardUncertainty: -1e-300, lower: 0 }],
    ['/standardUncertainty', { measured: 1, standardUncertainty: Number.POSITIVE_INFINITY, lower: 0 }],
    ['/rule/risk', { measured: 1, standardUncertainty: 1, lower: 0, rule: { kind: 'three-zone', risk: 0 } }],
    ['/rule/risk', { measured: 1, standardUncertainty: 1, lower: 0, rule: { kind: 'three-zone', risk: 0.51 } }],
    ['/rule/risk', { measured: 1, standardUncertainty: 1, lower: 0, rule: { kind: 'three-zone', risk: Number.NaN } }],
  ])('%s of %j', (pointer, request) => {
    let thrown: unknown;
    try {
      conformity(request);
    } catch (error) {
      thrown = error;
    }
    expect(thrown).toBeInstanceOf(InvalidQuantity);
    expect((thrown as InvalidQuantity).pointer).toBe(pointer);
  });
});
