/** A pulse of 12 V for 8 ms into 10 mH with 0.5 Ω, sampled every 0.1 ms, with a quiet part before it. */
const SAMPLES = 90;
const QUIET = 10;
const STEP_s = 1e-4;

const current = (k: number) => (k < QUIET ? 0 : 24 * (1 - Math.exp(-(k - QUIET) * STEP_s * 50)));
const rounded = (value: number) => Number(value.toPrecision(6));

export const EXAMPLE_PULSE = {
  time_s: Array.from({ length: SAMPLES }, (_, k) => rounded(k * STEP_s)),
  voltage_V: Array.from({ length: SAMPLES }, (_, k) => (k < QUIET ? 0 : 12)),
  current_A: Array.from({ length: SAMPLES }, (_, k) => rounded(current(k))),
  resistance_ohm: 0.5,
};
