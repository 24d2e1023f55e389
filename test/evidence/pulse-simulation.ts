import type { Pulse } from '../../src/evidence/pulse.ts';
import { fillNormals, streamOf } from '../../src/metrology/random.ts';
import type { FluxCharacteristic } from '../../src/physics/characteristic.ts';

/** What a pulse is simulated through: λ and dλ/di over i. */
export type Law = Pick<FluxCharacteristic, 'fluxLinkage_Wb' | 'differentialInductance_H'>;

/** A residual inductance beside a saturating one, in closed form; `knee_A` is the law's scale of current. */
export type Shape = 'hyperbolic tangent' | 'arctangent' | 'froehlich' | 'knee' | 'sharp knee' | 'rising first';

/** Inductance at zero current 1 mH, scale of current 2 A. */
export function lawOf(shape: Shape, residual: number): Law {
  const [L, I] = [1e-3, 2];
  const saturating = { slope: slopes[shape], value: values[shape] };
  return {
    differentialInductance_H: (i) => L * (residual + (1 - residual) * saturating.slope(i / I)),
    fluxLinkage_Wb: (i) => L * (residual * i + (1 - residual) * I * saturating.value(i / I)),
  };
}

const logistic = (width: number) => (x: number) => 1 / (1 + Math.exp((x - 1) / width));
const softplus = (x: number) => (x > 30 ? x : Math.log1p(Math.exp(x)));
const logisticIntegral = (width: number) => (x: number) =>
  x - width * (softplus((x - 1) / width) - softplus(-1 / width));
const sech2 = (x: number) => Math.cosh(x) ** -2;

const slopes: Record<Shape, (x: number) => number> = {
  'hyperbolic tangent': sech2,
  arctangent: (x) => 1 / (1 + x * x),
  froehlich: (x) => (1 + x) ** -2,
  knee: logistic(0.1),
  'sharp knee': logistic(0.02),
  'rising first': (x) => sech2(x - 0.4),
};

const values: Record<Shape, (x: number) => number> = {
  'hyperbolic tangent': Math.tanh,
  arctangent: Math.atan,
  froehlich: (x) => x / (1 + x),
  knee: logisticIntegral(0.1),
  'sharp knee': logisticIntegral(0.02),
  'rising first': (x) => Math.tanh(x - 0.4) + Math.tanh(0.4),
};

/** The first current at which dλ/di is down by 30 %, from the law itself. */
export function trueDropCurrent(law: Law): number {
  const level = 0.7 * law.differentialInductance_H(0);
  let [low, high] = [0, 1e-6];
  while (law.differentialInductance_H(high) > level) [low, high] = [high, high * 1.01];
  for (let k = 0; k < 60; k++) {
    const middle = (low + high) / 2;
    if (law.differentialInductance_H(middle) > level) low = middle;
    else high = middle;
  }
  return low;
}

export interface Recording {
  readonly samples: number;
  readonly peak_A: number;
  /** R·i at the peak over the voltage */
  readonly resistiveShare?: number;
  /** none: as exact as the solution */
  readonly bits?: number;
  /** what the quantisers' steps are spread over, 1.2 of the peaks: that to either side of zero (the default), or from zero up */
  readonly fullScale?: 'bipolar' | 'unipolar';
  /** rms noise before the quantiser, in its steps */
  readonly noise?: number;
  readonly seed?: number;
  /** parts of the record before the pulse, and with the voltage on */
  readonly quiet?: number;
  readonly on?: number;
  /** the voltage that takes the current down, over the one that took it up */
  readonly reverse?: number;
  /** what the channels read at zero, in parts of their peaks */
  readonly voltageOffset?: number;
  readonly currentOffset?: number;
  /** a voltage that stands or that swings */
  readonly drive?: 'step' | 'sine';
  /** times off the even by up to this part of an interval */
  readonly jitter?: number;
}

const DURATION_S = 1e-3;
/** Fewest steps of the solution over the record: at fourth order 1e-7 of the current even through the sharpest knee. */
const STEPS = 4000;

/**
 * A pulse through a law, sampled: voltage on until the current is at its peak, reversed until it is zero, by Runge and Kutta's fourth-order rule
 * on di/dt = (v − R·i)/(dλ/di), which knows nothing of what is to be found from it.
 */
export function recordPulse(law: Law, recording: Recording): Pulse & { readonly trueVoltageOffset_V: number } {
  const { samples, peak_A, bits, noise = 0, seed = 1, quiet = 0.1, on = 0.5, drive = 'step' } = recording;
  const {
    resistiveShare = 0.1,
    reverse = 1.1,
    voltageOffset = 0,
    currentOffset = 0,
    jitter = 0,
    fullScale = 'bipolar',
  } = recording;
  const normal = new Float64Array(3 * samples + 1);
  fillNormals(streamOf(seed, 0), normal);
  const onTime = on * DURATION_S;
  const shape = (t: number) => (drive === 'step' ? 1 : Math.sin(0.25 + (Math.PI / 2) * (t / onTime)));
  const slope = (voltage_V: number) => (i: number, v: number) =>
    (voltage_V * (v - (resistiveShare * i) / peak_A)) / law.differentialInductance_H(Math.abs(i));
  const voltage_V = voltageFor(peak_A, onTime, (v, t, i) => slope(v)(i, shape(t)));
  const move = slope(voltage_V);

  const interval = DURATION_S / samples;
  const start = quiet * DURATION_S + (0.5 + 0.4 * Math.tanh(normal[3 * samples]!)) * interval;
  const end = start + onTime;
  const time_s: number[] = [];
  const voltage: number[] = [];
  const current: number[] = [];
  let [t, i, over] = [start, 0, false];
  const advance = (to: number, driven: (t: number) => number) => {
    const count = Math.max(1, Math.ceil((to - t) / (DURATION_S / STEPS)));
    const h = (to - t) / count;
    for (let k = 0; k < count && !over; k++, t += h) {
      i = rungeKutta(move, driven, t - start, i, h);
      if (i <= 0 && t > end) [i, over] = [0, true];
    }
    t = to;
  };
  for (let k = 0; k < samples; k++) {
    const now = (k + jitter * Math.tanh(normal[2 * samples + k]!)) * interval;
    if (now > start && t < end) advance(Math.min(now, end), shape);
    if (now > end) advance(now, () => -reverse);
    time_s.push(now);
    voltage.push(now <= start || over ? 0 : voltage_V * (now <= end ? shape(now - start) : -reverse));
    current.push(now <= start ? 0 : i);
  }
  const digitise = (values: number[], first: number, offset: number) => {
    const peak = values.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
    const range = (fullScale === 'bipolar' ? 2 : 1) * 1.2 * peak;
    const step = bits === undefined ? 0 : range / 2 ** bits;
    return values.map((value, k) => {
      const analogue = value + offset * peak + noise * step * normal[first + k]!;
      return step > 0 ? Math.round(analogue / step) * step : analogue;
    });
  };
  return {
    time_s,
    voltage_V: digitise(voltage, 0, voltageOffset),
    current_A: digitise(current, samples, currentOffset),
    resistance_ohm: (resistiveShare * voltage_V) / peak_A,
    trueVoltageOffset_V: voltageOffset * voltage_V * Math.max(1, reverse),
  };
}

function rungeKutta(
  slope: (i: number, v: number) => number,
  driven: (t: number) => number,
  t: number,
  i: number,
  h: number,
): number {
  const [v0, v1, v2] = [driven(t), driven(t + h / 2), driven(t + h)];
  const k1 = slope(i, v0);
  const k2 = slope(i + (h / 2) * k1, v1);
  const k3 = slope(i + (h / 2) * k2, v1);
  const k4 = slope(i + h * k3, v2);
  return i + (h / 6) * (k1 + 2 * k2 + 2 * k3 + k4);
}

/** The voltage that brings the current to its peak while it is on. */
function voltageFor(peak_A: number, onTime: number, slope: (v: number, t: number, i: number) => number): number {
  const steps = 400;
  const reaches = (v: number) => {
    let i = 0;
    for (let k = 0; k < steps && i < 2 * peak_A; k++) {
      const h = onTime / steps;
      const t = k * h;
      const k1 = slope(v, t, i);
      i += h * slope(v, t + h / 2, i + (h / 2) * k1);
    }
    return i >= peak_A;
  };
  let [low, high] = [1e-9, 1e-9];
  while (!reaches(high)) [low, high] = [high, 2 * high];
  for (let k = 0; k < 12; k++) {
    const middle = (low + high) / 2;
    if (reaches(middle)) high = middle;
    else low = middle;
  }
  return high;
}
