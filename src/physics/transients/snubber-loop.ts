/** An inductor that discharges into a resistor and an empty capacitor in series, with the source in the loop or not. */
export interface SnubberLoop {
  readonly windingResistance_ohm: number;
  readonly initialCurrent_A: number;
  /** 0 where no source is in the loop. */
  readonly source_V: number;
  readonly pathResistance_ohm: number;
  readonly capacitance_F: number;
}

/**
 * How a series circuit of a constant inductance answers: y'' + 2αy' + ω₀²y = 0, every quantity of it that tends to zero.
 * `rate` is the faster of its two decay rates where it does not ring, else α; `otherRate` makes 2α with it.
 */
export interface Damping {
  readonly rings: boolean;
  readonly alpha: number;
  /** 1/(LC). */
  readonly naturalSquared: number;
  /** √|α² − ω₀²|: the angular frequency where it rings, half the difference of the decay rates where it does not. */
  readonly split: number;
  readonly rate: number;
  readonly otherRate: number;
}

/**
 * α² − ω₀² as a product and the slow rate as ω₀²/(fast rate): no cancellation from hardly damped to R²C/L of 1e20 and through
 * critical damping, where `split` goes to zero and every function below stays smooth.
 */
export function dampingOf(inductance_H: number, { pathResistance_ohm, ...loop }: SnubberLoop): Damping {
  const alpha = (loop.windingResistance_ohm + pathResistance_ohm) / (2 * inductance_H);
  const natural = 1 / (Math.sqrt(inductance_H) * Math.sqrt(loop.capacitance_F));
  const naturalSquared = natural * natural;
  const split = Math.sqrt(Math.abs(alpha - natural)) * Math.sqrt(alpha + natural);
  if (alpha < natural) return { rings: true, alpha, naturalSquared, split, rate: alpha, otherRate: alpha };
  const fast = alpha + split;
  return { rings: false, alpha, naturalSquared, split, rate: fast, otherRate: naturalSquared / fast };
}

/** 1/s: the rate at which the last of it dies away; 0 with no resistance. */
export function slowestRate({ rings, alpha, otherRate }: Damping): number {
  return rings ? alpha : otherRate;
}
