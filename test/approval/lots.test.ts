import { describe, expect, it } from 'vitest';
import { evaluate } from '../../src/approval/evaluate.ts';
import type { ApprovalRequest } from '../../src/approval/request.ts';

/** Lots as an approval finds them: n units of mean and standard deviation, limits 8 to 20, so that Cpk is min(mean − 8, 20 − mean)/3s. */
const request = (
  n: number,
  mean: number,
  standardDeviation: number,
  outOfCalibration = 0,
  duty = {},
): ApprovalRequest => ({
  part: { number: 'LG-1', revision: 'A' },
  duty: { peakCurrent_A: 1, ...duty },
  evidence: {
    lots: ['L-1'],
    lotSummaries: [
      {
        lot: 'L-1',
        counts: { pass: n - outOfCalibration, inconclusive: outOfCalibration, fail: 0, outOfCalibration },
        quantities: [{ quantity: 'inductance', limit: { lower: 8, upper: 20 }, n, mean, standardDeviation }],
      },
    ],
  },
});

const resultOf = (given: ApprovalRequest, name: string) => evaluate(given).checks.find(({ check }) => check === name)!;

describe('lot-capability', () => {
  it('passes a lot whose Cpk is well above the limit', () => {
    const result = resultOf(request(1000, 14, 1), 'lot-capability');
    expect(result).toMatchObject({ outcome: 'pass', limit: { lower: 1.33 } });
    expect(result.observed!.value).toBeCloseTo(2, 12);
  });

  it('fails the NIST/SEMATECH e-Handbook 6.1.6 example, Cpk 0.6667', () => {
    const result = resultOf(request(1000, 16, 2), 'lot-capability');
    expect(result.outcome).toBe('fail');
    expect(Math.abs(result.observed!.value - 0.6667)).toBeLessThan(5e-5);
  });

  it('leaves it open where few units were measured near the limit, and decides by the duty’s own limit', () => {
    expect(resultOf(request(12, 14, 1.5), 'lot-capability').outcome).toBe('inconclusive');
    expect(resultOf(request(12, 14, 1.5, 0, { evidence: { minimumCpk: 0.5 } }), 'lot-capability').outcome).toBe('pass');
    expect(resultOf(request(1, 14, 0), 'lot-capability').outcome).toBe('inconclusive');
  });

  it('says which least Cpk would pass', () => {
    const failing = request(1000, 16, 2, 0, { evidence: { minimumCpk: 1 } });
    const [relief] = resultOf(failing, 'lot-capability').relief!;
    expect(relief).toMatchObject({ pointer: '/duty/evidence/minimumCpk', from: 1 });
    expect(resultOf(request(1000, 16, 2, 0, { evidence: { minimumCpk: relief!.to } }), 'lot-capability').outcome).toBe(
      'pass',
    );
  });
});

describe('calibration', () => {
  it('passes where every rig was in calibration, and leaves it open otherwise', () => {
    expect(resultOf(request(10, 14, 1), 'calibration').outcome).toBe('pass');
    const late = resultOf(request(10, 14, 1, 3), 'calibration');
    expect(late.outcome).toBe('inconclusive');
    expect(late.detail).toMatch(/3 units were measured out of calibration/);
  });
});

describe('the verdict', () => {
  it('counts the units of lots towards the duty’s minimum', () => {
    expect(evaluate(request(30, 14, 0.5, 0, { evidence: { minimumUnits: 30 } })).verdict).toBe('approve');
    const short = evaluate(request(29, 14, 0.5, 0, { evidence: { minimumUnits: 30 } }));
    expect([short.verdict, short.reasons]).toEqual(['refer', ['The duty asks for 30 measured units; there are 29.']]);
  });
});
