import {
  type Drive,
  responseCurrent,
  responseIntegral,
  responseSigma,
  responseSquareIntegral,
  responseVoltage,
  settledCurrent,
} from './unit-response.ts';

/** Time along a response in σ (see unit-response.ts), whose current moves one way: dt = L_d dσ. */
export interface Clock {
  /** When its end is reached, in s; Infinity where that is for a time to say. */
  readonly duration_s: number;
  /** When the current is there, in s; Infinity where it is not, or beyond where the clock ends. */
  timeOf(current_A: number): number;
  /** Current and dλ/dt, the voltage across the inductance. */
  at(time_s: number): { readonly current_A: number; readonly voltage_V: number };
  /** From the start: ∫ i dt in A·s, ∫ i² dt in A²·s. */
  integralsTo(time_s: number): { readonly charge: number; readonly square: number };
}

/** Where a clock has to reach: a current, a σ or a time, whichever comes first. The current may be one that is only approached. */
export interface ClockEnd {
  readonly current_A: number;
  readonly sigma: number;
  readonly time_s: number;
}

/** The clock of a constant inductance: closed forms. */
export function linearClock(inductance_H: number, drive: Drive, end: ClockEnd): Clock {
  const sigmaThere = reaches(drive, end.current_A) ? responseSigma(drive, end.current_A) : Infinity;
  const sigmaEnd = Math.min(end.sigma, sigmaThere);
  const sigmaAt = (time_s: number) => Math.min(time_s / inductance_H, sigmaEnd);
  return {
    duration_s: inductance_H * sigmaEnd,
    timeOf: (current_A) => (reaches(drive, current_A) ? inductance_H * responseSigma(drive, current_A) : Infinity),
    at: (time_s) => {
      const sigma = sigmaAt(time_s);
      return {
        current_A: sigma === sigmaThere ? end.current_A : responseCurrent(drive, sigma),
        voltage_V: responseVoltage(drive, sigma),
      };
    },
    integralsTo: (time_s) => {
      const sigma = sigmaAt(time_s);
      return {
        charge: inductance_H * responseIntegral(drive, sigma),
        square: inductance_H * responseSquareIntegral(drive, sigma),
      };
    },
  };
}

/** The clock of a current that stays where it is, because source and resistance balance. */
export function standingClock(current_A: number, duration_s: number): Clock {
  return {
    duration_s,
    timeOf: (current) => (current === current_A ? 0 : Infinity),
    at: () => ({ current_A, voltage_V: 0 }),
    integralsTo: (time_s) => ({ charge: current_A * time_s, square: current_A * current_A * time_s }),
  };
}

/** Whether the response comes to a current at a finite time. */
export function reaches(drive: Drive, current_A: number): boolean {
  const [from, to] = [drive.initialCurrent_A, settledCurrent(drive)];
  return current_A === from || (current_A - from) * (to - current_A) > 0;
}
