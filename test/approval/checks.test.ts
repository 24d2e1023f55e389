import { describe, expect, it } from 'vitest';
import { CHECK_NAMES, type CheckName } from '../../src/approval/check.ts';
import { evaluate } from '../../src/approval/evaluate.ts';
import type { ApprovalRequest } from '../../src/approval/request.ts';

/**
 * Every check with a case that passes, one that fails and one that is inconclusive. The quantity is worked out here, by a closed form
 * of the same model that the code does not use, or by plain quadrature; the limit is then put beside it: well inside, well
 * outside, and on the value itself, where the conformance probability is one half.
 */
interface Case {
  readonly check: CheckName;
  /** the value, worked out here */
  readonly value: number;
  /** how near the observed value must come to it */
  readonly tolerance: number;
  readonly side: 'lower' | 'upper';
  readonly request: (limit: number) => ApprovalRequest;
}

const MU_0 = 4e-7 * Math.PI;
const part = { number: 'LG-T-1', revision: 'A' };
const wide = { nominal_H: 1e-3, lower_H: 1e-12, upper_H: 1e3 };

// A ring on a core of Fröhlich's curve, without a gap: everything follows from the field strength in closed form.
const TURNS = 50;
const AREA = 1e-4;
const LENGTH = 0.1;
const JS = 1.1;
const CHI = 99;
const cored = {
  shape: 'cored',
  turns: TURNS,
  core: {
    effectiveArea_m2: AREA,
    effectiveLength_m: LENGTH,
    material: { initialPermeability: CHI + 1, saturation: { fluxDensity_T: JS }, magnetisation: 'froehlich' },
  },
} as const;
const fluxDensityAt = (h: number) => MU_0 * h + (CHI * MU_0 * h) / (1 + (CHI * MU_0 * h) / JS);
const slopeAt = (h: number) => MU_0 * (1 + CHI / (1 + (CHI * MU_0 * h) / JS) ** 2);
const currentAt = (h: number) => (h * LENGTH) / TURNS;
/** ∫ H dB over the volume, by Simpson's rule on H dB/dH. */
function energyUpTo(h: number): number {
  const n = 2000;
  let sum = 0;
  for (let k = 0; k <= n; k++) {
    const x = (h * k) / n;
    sum += (k === 0 || k === n ? 1 : k % 2 ? 4 : 2) * x * slopeAt(x);
  }
  return ((sum * h) / n / 3) * AREA * LENGTH;
}
const PEAK_H = 6000;
const PEAK = currentAt(PEAK_H);
const duty = { peakCurrent_A: PEAK };

// dB/dH has fallen by d where 1 + χ/(1 + x)² = (1 − d)(1 + χ).
const DROP = 0.3;
const dropX = Math.sqrt(CHI / ((1 - DROP) * (1 + CHI) - 1)) - 1;
const dropCurrent = currentAt((dropX * JS) / (CHI * MU_0));

// B = Js where µ0 H = Js/(1 + x), so x (1 + x) = χ.
const limitH = (((Math.sqrt(1 + 4 * CHI) - 1) / 2) * JS) / (CHI * MU_0);

// A thin solenoid sheet's field far away is a dipole's; on the axis exactly that of two end discs' solid angles.
const SOLENOID = { shape: 'solenoid', turns: 200, diameter_m: 0.02, length_m: 0.05 } as const;
const DISTANCE = 0.4;
const axialField =
  ((MU_0 * SOLENOID.turns * PEAK) / (2 * SOLENOID.length_m)) *
  ((DISTANCE + 0.025) / Math.hypot(DISTANCE + 0.025, 0.01) - (DISTANCE - 0.025) / Math.hypot(DISTANCE - 0.025, 0.01));

// A linear coil interrupted into a clamp, winding without resistance: a straight line down.
const toroid = {
  shape: 'toroid',
  section: 'rectangle',
  turns: 400,
  innerDiameter_m: 0.05,
  outerDiameter_m: 0.09,
  height_m: 0.03,
} as const;
const toroidL = (MU_0 * 400 ** 2 * 0.03 * Math.log(9 / 5)) / (2 * Math.PI);
const CLAMP = 80;
const interruption = { path: { kind: 'clamp', clamp_V: CLAMP } } as const;

const winding = { turns: 400, meanTurnLength_m: 0.1, wireDiameter_m: 0.0005 };
const resistance20 = (400 * 0.1) / (58e6 * (Math.PI / 4) * 0.0005 ** 2);

const AMBIENT = 40;
const HEATING = 10 * 1 ** 2 * resistance20;

// A unit whose differential inductance falls along a straight line, L0 (1 − i/20 A).
const L0 = 1e-3;
const SWEEP_CURRENTS = [0, 1, 2, 3, 4, 5, 6, 7, 8, 9, 10];
const unit = {
  serial: 'U-1',
  measuredAt: '2026-01-05T08:00:00Z',
  instrument: {
    inductance: { relative: 0.01, offset_H: 0 },
    current: { relative: 0.005, offset_A: 0.001 },
    resistance: { relative: 0.01, offset_ohm: 0 },
  },
  temperature_degC: 25,
  resistance_ohm: 0.5,
  sweep: {
    kind: 'differential',
    current_A: SWEEP_CURRENTS,
    inductance_H: SWEEP_CURRENTS.map((i) => L0 * (1 - i / 20)),
  },
} as const;

const CASES: readonly Case[] = [
  {
    check: 'construction-inductance',
    value: toroidL,
    tolerance: 1e-9,
    side: 'lower',
    request: (limit) => ({
      part: {
        ...part,
        construction: { coil: toroid },
        drawing: { inductance: { nominal_H: limit, lower_H: limit, upper_H: 1e3 } },
      },
      duty,
    }),
  },
  {
    check: 'inductance-at-peak',
    value: (TURNS ** 2 * AREA * slopeAt(PEAK_H)) / LENGTH,
    tolerance: 1e-8,
    side: 'lower',
    request: (limit) => ({
      part: { ...part, construction: { coil: cored } },
      duty: { ...duty, required: { inductanceAtPeak_H: limit } },
    }),
  },
  {
    check: 'saturation-current',
    value: dropCurrent,
    tolerance: 1e-8,
    side: 'lower',
    request: (limit) => ({
      part: {
        ...part,
        construction: { coil: cored },
        drawing: { inductance: wide, saturation: { current_A: limit, inductanceDrop: DROP, temperature_degC: 25 } },
      },
      duty,
    }),
  },
  {
    check: 'flux-density',
    value: fluxDensityAt(PEAK_H),
    tolerance: 1e-8,
    side: 'upper',
    request: (limit) => {
      // The limit is the saturation flux density less the margin; the material stays, so only limits up to it can be put.
      const fluxMargin = 1 - limit / JS;
      const over = limit > JS;
      return {
        part: { ...part, construction: { coil: cored } },
        duty: { peakCurrent_A: over ? PEAK / 4 : PEAK, required: { fluxMargin: over ? 0 : fluxMargin } },
      };
    },
  },
  {
    check: 'stored-energy',
    value: energyUpTo(PEAK_H),
    tolerance: 1e-8,
    side: 'lower',
    request: (limit) => ({
      part: { ...part, construction: { coil: cored } },
      duty: { ...duty, required: { storedEnergy_J: limit } },
    }),
  },
  {
    check: 'core-energy-capacity',
    value: energyUpTo(limitH),
    tolerance: 1e-7,
    side: 'lower',
    request: (limit) => ({
      part: { ...part, construction: { coil: cored } },
      duty: { ...duty, required: { storedEnergy_J: limit } },
    }),
  },
  {
    check: 'winding-resistance',
    value: resistance20,
    tolerance: 1e-9,
    side: 'upper',
    request: (limit) => ({
      part: {
        ...part,
        construction: { coil: toroid, winding },
        drawing: { inductance: wide, resistance: { upper_ohm: limit, temperature_degC: 20 } },
      },
      duty,
    }),
  },
  {
    check: 'temperature-rise',
    // ΔT = R_th I² R₂₀ (1 + α (T_a + ΔT − 20)), solved for ΔT.
    value: AMBIENT + (HEATING * (1 + 0.00393 * (AMBIENT - 20))) / (1 - 0.00393 * HEATING),
    tolerance: 1e-8,
    side: 'upper',
    request: (limit) => ({
      part: { ...part, construction: { coil: toroid, winding, cooling: { thermalResistance_K_per_W: 10 } } },
      duty: { ...duty, rmsCurrent_A: 1, ambient_degC: AMBIENT, hotspotLimit_degC: limit },
    }),
  },
  {
    check: 'turn-off-voltage',
    value: CLAMP,
    tolerance: 1e-9,
    side: 'upper',
    request: (limit) => ({
      part: { ...part, construction: { coil: toroid } },
      duty: { ...duty, interruption: { ...interruption, voltageLimit_V: limit } },
    }),
  },
  {
    check: 'turn-off-time',
    value: (toroidL * PEAK) / CLAMP,
    tolerance: 1e-8,
    side: 'upper',
    request: (limit) => ({
      part: { ...part, construction: { coil: toroid } },
      duty: { ...duty, interruption: { ...interruption, timeLimit_s: limit } },
    }),
  },
  {
    check: 'path-energy',
    value: (toroidL * PEAK ** 2) / 2,
    tolerance: 1e-8,
    side: 'upper',
    request: (limit) => ({
      part: { ...part, construction: { coil: toroid } },
      duty: { ...duty, interruption: { ...interruption, pathEnergyLimit_J: limit } },
    }),
  },
  {
    check: 'stray-field',
    value: axialField,
    tolerance: 1e-8,
    side: 'upper',
    request: (limit) => ({
      part: { ...part, construction: { coil: SOLENOID } },
      duty: { ...duty, strayField: { distance_m: DISTANCE, limit_T: limit } },
    }),
  },
  {
    check: 'measured-inductance',
    value: L0,
    tolerance: 1e-9,
    side: 'lower',
    request: (limit) => ({
      part: { ...part, drawing: { inductance: { nominal_H: limit, lower_H: limit, upper_H: 1e3 } } },
      duty,
      evidence: { units: [unit] },
    }),
  },
  {
    check: 'measured-saturation',
    value: 6,
    tolerance: 1e-6,
    side: 'lower',
    request: (limit) => ({
      part: {
        ...part,
        drawing: { inductance: wide, saturation: { current_A: limit, inductanceDrop: DROP, temperature_degC: 25 } },
      },
      duty,
      evidence: { units: [unit] },
    }),
  },
  {
    check: 'measured-energy',
    value: L0 * (8 ** 2 / 2 - 8 ** 3 / 60),
    tolerance: 1e-6,
    side: 'lower',
    request: (limit) => ({
      part,
      duty: { peakCurrent_A: 8, required: { storedEnergy_J: limit } },
      evidence: { units: [unit] },
    }),
  },
  {
    check: 'measured-resistance',
    value: (0.5 * (1 + 0.00393 * 60)) / (1 + 0.00393 * 5),
    tolerance: 1e-9,
    side: 'upper',
    request: (limit) => ({
      part: { ...part, drawing: { inductance: wide, resistance: { upper_ohm: limit, temperature_degC: 80 } } },
      duty,
      evidence: { units: [unit] },
    }),
  },
];

/** Every number that a case's quantity hangs on gets a tolerance, so that a limit on the value itself is undecided. */
const TOLERANCE: Readonly<Record<string, number>> = {
  '/part/construction/coil/turns': 0.5,
  '/part/construction/winding/turns': 2,
  '/duty/peakCurrent_A': 0.05,
  '/duty/interruption/path/clamp_V': 1,
};

function withTolerances(request: ApprovalRequest): ApprovalRequest {
  const present = Object.entries(TOLERANCE).filter(
    ([pointer]) =>
      typeof pointer
        .split('/')
        .slice(1)
        .reduce<unknown>((node, key) => (node as Record<string, unknown> | undefined)?.[key], request) === 'number',
  );
  return { ...request, uncertainty: Object.fromEntries(present) };
}

const resultOf = (request: ApprovalRequest, check: CheckName) =>
  evaluate(request).checks.find((result) => result.check === check)!;

describe.each(CASES)('$check', ({ check, value, tolerance, side, request }) => {
  const [inside, outside] = side === 'lower' ? [0.1, 2] : [2, 0.5];

  it('observes the quantity and passes well inside its limit', () => {
    const result = resultOf(request(value * inside), check);
    expect(result.outcome).toBe('pass');
    expect(result.relief).toBeUndefined();
    expect(result.margin).toBeGreaterThan(0);
    expect(result.conformanceProbability).toBeGreaterThan(0.95);
    expect(result.detail).toMatch(/inside the limit/);
    expect(result.method.name).toBeTruthy();
  });

  it('fails well outside its limit, with the value that was worked out', () => {
    const result = resultOf(request(value * outside), check);
    expect(result.outcome).toBe('fail');
    expect(Math.abs(result.observed!.value / value - 1)).toBeLessThan(tolerance);
    expect(result.margin).toBeLessThan(0);
    expect(result.detail).toMatch(/outside the limit/);
  });

  it('is inconclusive on its limit, with tolerances', () => {
    const result = resultOf(withTolerances(request(value)), check);
    expect(result.outcome).toBe('inconclusive');
    expect(result.observed!.standardUncertainty).toBeGreaterThan(0);
    expect(result.conformanceProbability).toBeGreaterThan(0.05);
    expect(result.conformanceProbability).toBeLessThan(0.95);
  });

  it('says what would relieve it, and each relief that it names makes it pass', () => {
    const failing = request(value * outside);
    const { relief } = resultOf(failing, check);
    expect(relief!.length).toBeGreaterThan(0);
    const found = relief!.filter(({ to }) => to !== null);
    expect(found.length).toBeGreaterThan(0);
    for (const { pointer, to } of found) expect(resultOf(changed(failing, pointer, to!), check).outcome).toBe('pass');
    for (const { to, reason } of relief!) if (to === null) expect(reason).toBeTruthy();
  });
});

function changed(request: ApprovalRequest, pointer: string, value: number): ApprovalRequest {
  const copy = structuredClone(request) as unknown as Record<string, unknown>;
  const keys = pointer.split('/').slice(1);
  const last = keys.pop()!;
  const container = keys.reduce((node, key) => node[key] as Record<string, unknown>, copy);
  container[last] = value;
  return copy as unknown as ApprovalRequest;
}

describe('the list of checks', () => {
  it('is tested whole', () => {
    const elsewhere = ['lot-capability', 'calibration']; // lots.test.ts
    expect(CHECK_NAMES.filter((name) => !CASES.some(({ check }) => check === name))).toEqual(elsewhere);
  });
});
