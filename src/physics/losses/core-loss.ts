import { InvalidQuantity } from '../invalid-quantity.ts';
import type { Method } from '../method.ts';
import { loopSum } from './flux-loops.ts';

/** Steinmetz parameters: P = k·f^alpha·B^beta in W/m³, f in Hz, B the amplitude of the sine in T. */
export interface SteinmetzParameters {
  readonly k: number;
  readonly alpha: number;
  readonly beta: number;
}

export interface SineFlux {
  readonly frequency_Hz: number;
  readonly amplitude_T: number;
}

/** One period of flux density, linear between its points; `phase` is the fraction of the period. */
export interface PiecewiseLinearFlux {
  readonly frequency_Hz: number;
  readonly phase: readonly number[];
  readonly fluxDensity_T: readonly number[];
}

export type Flux = SineFlux | PiecewiseLinearFlux;

export interface LossyCore {
  readonly volume_m3: number;
  readonly loss: SteinmetzParameters;
}

/** How far the last point of a period may lie from the first, relative to the largest flux density: what rounding leaves. */
const CLOSURE = 1e-9;

/**
 * Core loss in W: Steinmetz's equation for a sine, the improved generalised Steinmetz equation for a piecewise-linear flux.
 * Throws `InvalidQuantity` at a field of the flux (see `igseLossDensity_W_per_m3`; pointers are relative to the flux).
 */
export function coreLoss(core: LossyCore, flux: Flux): { power_W: number; method: Method } {
  return 'amplitude_T' in flux
    ? { power_W: core.volume_m3 * steinmetzLossDensity_W_per_m3(core.loss, flux), method: STEINMETZ }
    : { power_W: core.volume_m3 * igseLossDensity_W_per_m3(core.loss, flux), method: IGSE };
}

/** P = k·f^α·B^β, C. P. Steinmetz, "On the law of hysteresis", Trans. AIEE 9 (1892), with the frequency's exponent added. */
export function steinmetzLossDensity_W_per_m3(loss: SteinmetzParameters, flux: SineFlux): number {
  return loss.k * flux.frequency_Hz ** loss.alpha * flux.amplitude_T ** loss.beta;
}

/**
 * Improved generalised Steinmetz equation, in W/m³:
 *
 *   P = (1/T)·∫ k_i·|dB/dt|^α·(ΔB)^{β−α} dt,  k_i = k / ((2π)^{α−1}·2^{β−α}·∫₀^{2π} |cos θ|^α dθ)
 *
 * with ΔB the peak-to-peak flux density of the loop that the moment belongs to: minor loops are split off and each is
 * taken with its own. K. Venkatachalam, C. R. Sullivan, T. Abdallah, H. Tacca, "Accurate prediction of ferrite core loss with
 * nonsinusoidal waveforms using only Steinmetz parameters", IEEE COMPEL 2002. Equal to Steinmetz's equation for a sine.
 *
 * Throws `InvalidQuantity` at `/phase` or `/phase/i` (outside [0, 1], not increasing, fewer than two),
 * `/fluxDensity_T` (not as many as phases) and `/fluxDensity_T/i` (a period of length 1 that does not end where it began).
 */
export function igseLossDensity_W_per_m3(loss: SteinmetzParameters, flux: PiecewiseLinearFlux): number {
  const { k, alpha, beta } = loss;
  const { span, sum } = loopSum(closedPeriod(flux), alpha, beta - alpha);
  if (span === 0) return 0;
  const coefficient = k / ((2 * Math.PI) ** (alpha - 1) * 2 ** (beta - alpha) * cosinePowerIntegral(alpha));
  return coefficient * flux.frequency_Hz ** alpha * span ** beta * sum;
}

/**
 * ∫₀^{2π} |cos θ|^α dθ = 2√π·Γ((α+1)/2)/Γ(α/2+1), DLMF 5.12.2, for α ≥ 0.
 *
 * The quotient of Gammas half a step apart: Γ(y)/Γ(y+½) = (y+½)/y·Γ(y+1)/Γ(y+3/2) until y ≥ 20, there its expansion in powers
 * of 1/(y − ¼)² (DLMF 5.11.14), whose first neglected term is 3e-16.
 *
 * | α         | worst relative error | against           |
 * |-----------|----------------------|-------------------|
 * | 0.01 … 100 | 1.2e-15              | mpmath, 50 digits |
 */
export function cosinePowerIntegral(alpha: number): number {
  let y = (alpha + 1) / 2;
  let factor = 2 * Math.sqrt(Math.PI);
  for (; y < 20; y++) factor *= (y + 0.5) / y;
  const w = y - 0.25;
  const u = 1 / (w * w);
  const inverse = 1 + u * (1 / 64 - u * (19 / 8192 - u * (631 / 524288 - (u * 174317) / 134217728)));
  return factor / (Math.sqrt(w) * inverse);
}

/** The points of one whole period, first point repeated at the end one period later. */
function closedPeriod({ phase, fluxDensity_T }: PiecewiseLinearFlux): { phase: number[]; value: number[] } {
  if (phase.length < 2) throw new InvalidQuantity('/phase', 'a period needs at least two points');
  if (fluxDensity_T.length !== phase.length) {
    throw new InvalidQuantity('/fluxDensity_T', `${fluxDensity_T.length} flux densities for ${phase.length} phases`);
  }
  phase.forEach((p, i) => {
    if (!(p >= 0 && p <= 1))
      throw new InvalidQuantity(`/phase/${i}`, 'a phase is a fraction of the period, from 0 to 1');
    if (i > 0 && p <= phase[i - 1]!)
      throw new InvalidQuantity(`/phase/${i}`, 'phases must increase from point to point');
  });
  const last = phase.length - 1;
  const first_T = fluxDensity_T[0]!;
  if (phase[last]! - phase[0]! < 1) return { phase: [...phase, phase[0]! + 1], value: [...fluxDensity_T, first_T] };
  const largest_T = fluxDensity_T.reduce((most, b) => Math.max(most, Math.abs(b)), 0);
  if (Math.abs(fluxDensity_T[last]! - first_T) > CLOSURE * largest_T) {
    throw new InvalidQuantity(
      `/fluxDensity_T/${last}`,
      `the period ends at ${fluxDensity_T[last]} T but began at ${first_T} T`,
    );
  }
  return { phase: [...phase], value: [...fluxDensity_T.slice(0, last), first_T] };
}

const STEINMETZ: Method = {
  name: "core loss of a sine by Steinmetz's equation",
  references: ['C. P. Steinmetz, On the law of hysteresis, Trans. AIEE 9 (1892)'],
  relativeError: 0.2,
  validity:
    'frequency, amplitude and temperature within the range that k, alpha and beta were fitted over; no steady magnetisation ' +
    'superposed (it can double the loss); 20 % is common practice for a fit and the spread between cores',
};

const IGSE: Method = {
  name: 'core loss of a piecewise-linear flux by the improved generalised Steinmetz equation, minor loops split',
  references: [
    'K. Venkatachalam, C. R. Sullivan, T. Abdallah, H. Tacca, Accurate prediction of ferrite core loss with nonsinusoidal ' +
      'waveforms using only Steinmetz parameters, IEEE COMPEL 2002',
  ],
  relativeError: 0.3,
  validity:
    'harmonics that matter within the range that k, alpha and beta were fitted over; no steady magnetisation superposed; ' +
    'while the flux stands still no loss is counted (relaxation neglected, which underestimates waveforms with long rests); ' +
    '30 % is common practice',
};
