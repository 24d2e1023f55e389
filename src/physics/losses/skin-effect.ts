import { VACUUM_PERMEABILITY_H_PER_M } from '../constants.ts';

/**
 * Skin depth δ = √(ρ/(π f µ0)) in m of a non-magnetic conductor; Infinity at 0 Hz.
 * Displacement current is neglected: a part in ω ε0 ρ, 1e-9 for copper at 1 THz.
 */
export function skinDepth_m(resistivity_ohm_m: number, frequency_Hz: number): number {
  return Math.sqrt(resistivity_ohm_m / (Math.PI * VACUUM_PERMEABILITY_H_PER_M)) / Math.sqrt(frequency_Hz);
}

/**
 * R/R_dc of a long, straight, isolated round wire, exact for its model: Re[ s·I₀(s)/(2·I₁(s)) ] with s = √j·x and
 * x = √2·a/δ, a the radius. The argument x is that of NBS Circular 74 (1924), Table 17; the function is
 * (x/2)·(ber x bei′x − bei x ber′x)/(ber′²x + bei′²x) in Kelvin's terms. No Bessel function is evaluated on its own, so
 * nothing overflows: the quotient has a continued fraction whose every term adds (DLMF 10.33.1), and from x = 40 an
 * asymptotic series.
 *
 * | x            | worst relative error | against                 |
 * |--------------|----------------------|-------------------------|
 * | 0 … 40       | 3e-16                | mpmath, 50 digits       |
 * | 40 … 1e9     | 3e-16                | mpmath, 50 digits       |
 */
export function roundWireResistanceRatio(x: number): number {
  return x < SERIES_FROM ? byContinuedFraction(x) : byAsymptoticSeries(x);
}

/** e^{−√2·x}, what the asymptotic series leaves out, is 3e-25 here and its first neglected term 1e-17. */
const SERIES_FROM = 40;

/**
 * s·I₀/(2·I₁) = c₁/2 with c_k = 2k + s²/c_{k+1}, s² = j·x². Started far enough out it is run backwards; real and imaginary
 * part of every c_k are positive, so no step cancels.
 */
function byContinuedFraction(x: number): number {
  // Converged to the last place: 2 terms at x = 0.01, 9 at 1, 21 at 10, 42 at 40; the line below stays above those.
  const last = Math.ceil(12 + 0.9 * x);
  const square = x * x;
  let re = 2 * last;
  let im = 0;
  for (let k = last - 1; k >= 1; k--) {
    const scale = square / (re * re + im * im);
    [re, im] = [2 * k + scale * im, scale * re];
  }
  return re / 2;
}

/**
 * I₀(s)/I₁(s) ~ Σ b_k s^{−k}: put into the Riccati equation r′ = 1 − r² + r/s that the quotient obeys, the powers give
 * 2·b_{k+1} = (k + 1)·b_k − Σ_{i=1}^{k} b_i b_{k+1−i}, b₀ = 1.
 */
const SERIES = ((): readonly number[] => {
  const b = [1, 0.5];
  for (let k = 1; k < 14; k++) {
    let next = (k + 1) * b[k]!;
    for (let i = 1; i <= k; i++) next -= b[i]! * b[k + 1 - i]!;
    b.push(next / 2);
  }
  return b;
})();

function byAsymptoticSeries(x: number): number {
  // Re[s^{1−k}] = x^{1−k}·cos((1 − k)π/4)
  let sum = 0;
  for (let k = SERIES.length - 1; k >= 0; k--) sum += SERIES[k]! * x ** (1 - k) * Math.cos(((1 - k) * Math.PI) / 4);
  return sum / 2;
}
