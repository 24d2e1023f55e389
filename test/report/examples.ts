import type { HistogramData } from '../../src/report/histogram.ts';
import type { InductanceLimits } from '../../src/report/inductance-limits.ts';
import type { LotFanData } from '../../src/report/lot-fan.ts';
import type { TrendData } from '../../src/report/trend.ts';
import type { UnitCurveData } from '../../src/report/unit-curve.ts';

/** A gapped choke of 48 µH whose inductance halves around 18 A, as a plain formula; the figures draw whatever they are given. */
const falling = (initial_H: number, half_A: number) => (current_A: number) =>
  initial_H / (1 + (current_A / half_A) ** 4);

const steps = (last: number, n: number) => Array.from({ length: n + 1 }, (_, i) => (last * i) / n);

const LIMITS: InductanceLimits = {
  inductance: { lower_H: 42.3e-6, upper_H: 51.7e-6, testCurrent_A: 0 },
  saturation: { inductanceDrop: 0.3, current_A: 12.5 },
};

export const CHOKE: UnitCurveData = {
  serial: 'A-0001',
  lot: 'L2026-31',
  measured: {
    current_A: steps(20, 16),
    inductance_H: steps(20, 16).map((i, k) => falling(48e-6, 18)(i) * (1 + 0.006 * Math.sin(3 * k))),
  },
  curve: { current_A: steps(20, 80), inductance_H: steps(20, 80).map(falling(48e-6, 18)) },
  initialInductance_H: 48e-6,
  dropCurrent: { current_A: 14.5642 },
  limits: LIMITS,
};

const fanCurrents = steps(20, 40);
export const LOT: LotFanData = {
  lot: 'L2026-31',
  n: 1480,
  current_A: fanCurrents,
  quantiles: {
    p05: fanCurrents.map(falling(45.1e-6, 16.6)),
    p25: fanCurrents.map(falling(46.9e-6, 17.4)),
    p50: fanCurrents.map(falling(48e-6, 18)),
    p75: fanCurrents.map(falling(49.2e-6, 18.5)),
    p95: fanCurrents.map(falling(50.8e-6, 19.1)),
  },
  initialInductance_H: 48e-6,
  limits: LIMITS,
};

export const HISTOGRAM: HistogramData = {
  label: 'inductance at 0 A',
  unit: 'H',
  lot: 'L2026-31',
  edges: Array.from({ length: 25 }, (_, i) => (42 + i * 0.4) * 1e-6),
  counts: [0, 0, 1, 3, 8, 17, 34, 60, 95, 131, 165, 190, 188, 170, 139, 104, 72, 45, 26, 13, 6, 2, 1, 0],
  below: 2,
  above: 5,
  limits: { lower: 42.3e-6, upper: 51.7e-6 },
  n: 1477,
  mean: 46.9314e-6,
  standardDeviation: 1.2345e-6,
  capability: { cpk: 1.2504, interval: { lower: 1.2019, upper: 1.2989, confidence: 0.95 } },
};

export const TREND: TrendData = {
  label: 'inductance at 0 A',
  unit: 'H',
  by: 'lot',
  groups: [47.9, 48.3, 47.2, 48.8, 46.4, 47.7].map((mean, i) => ({
    name: `L2026-${26 + i}`,
    n: [1480, 1502, 990, 1, 1333, 1275][i]!,
    mean: mean * 1e-6,
    ...(i === 3 ? {} : { standardDeviation: (0.9 + 0.1 * i) * 1e-6 }),
  })),
  limits: { lower: 42.3e-6, upper: 51.7e-6 },
};
