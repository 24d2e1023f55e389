import { type FluxCharacteristic, methodAt } from '../characteristic.ts';
import { InvalidQuantity } from '../invalid-quantity.ts';
import type { Method } from '../method.ts';
import { type Course, outOfRange } from './course.ts';
import { linearSnubberCourse } from './linear-snubber.ts';
import { loopCourse } from './loop.ts';
import { bounded } from './panel.ts';
import { type Path, type StaticPath, staticPath } from './path.ts';
import { saturatingSnubberCourse } from './saturating-snubber.ts';

interface AnyEvent {
  /** Constant through the event, ≥ 0. */
  readonly windingResistance_ohm: number;
  /** Ends the answer there; absent: the event's own end (see `transient`). */
  readonly until_s?: number;
  /** Points of the waveform, evenly spaced in time from 0 to the end, both included; ≥ 2, absent: 200. */
  readonly samples?: number;
  readonly safeCurrent_A?: number;
}

/** A voltage is put across an inductor that carries no current. */
export interface Energise extends AnyEvent {
  readonly event: 'energise';
  readonly source_V: number;
}

/** The current of an inductor is interrupted and goes on through the path; `source_V` where the source stays in the loop. */
export interface Interrupt extends AnyEvent {
  readonly event: 'interrupt';
  readonly initialCurrent_A: number;
  readonly path?: Path;
  readonly source_V?: number;
}

export type TransientRequest = Energise | Interrupt;

/** Where the energy was, came from and went, from 0 to the end; initial + delivered = winding + path + final + residual. */
export interface TransientEnergy {
  /** Stored in the inductor at the start. */
  readonly initial_J: number;
  /** By the source. */
  readonly delivered_J: number;
  /** Into the winding's resistance. */
  readonly winding_J: number;
  /** Into the path: its resistance, its constant voltage, and what is left in its capacitor. */
  readonly path_J: number;
  /** Left in the snubber's capacitor at the end; a part of `path_J`, 0 without a capacitor. */
  readonly capacitor_J: number;
  /** Stored in the inductor at the end. */
  readonly final_J: number;
  /** What the others leave over: each is integrated on its own, so this measures the calculation. */
  readonly residual_J: number;
}

export interface Transient {
  /** Largest |voltage| across the path; when energising, across the inductance. */
  readonly peakVoltage_V: number;
  /**
   * First time from which |i| is at or below `safeCurrent_A` and stays there for good, looking beyond the end where it rings;
   * null where that is not so by the end, or no safe current is given.
   */
  readonly timeToSafe_s: number | null;
  /** First time at which the current is zero; null where it only approaches zero, or does not come to it by the end. */
  readonly timeToZero_s: number | null;
  readonly finalCurrent_A: number;
  readonly energy: TransientEnergy;
  /** Equal arrays; `voltage_V` is across the path, when energising across the inductance (dλ/dt). */
  readonly waveform: {
    readonly time_s: readonly number[];
    readonly current_A: readonly number[];
    readonly voltage_V: readonly number[];
  };
  readonly method: Method;
}

/** Points of the waveform where `samples` is absent. */
export const DEFAULT_SAMPLES = 200;

/**
 * The turn-on or turn-off transient of an inductor, over any flux characteristic: dλ/dt = source − R_w·i − v_path.
 *
 * Without `until_s` it ends where a diode or clamp has brought the current to zero; else where what is left of the change is
 * 0.1 % (6.9 of the longest time constant; with a snubber that of the inductance at zero current) or, if later, where the
 * current is safe for good. A snubber with no resistance in the loop: after 20.5 periods; a saturating inductor that rings for
 * very long: after 50 oscillations.
 *
 * After a diode or clamp has blocked the current is 0 and the path holds the source's voltage, or none.
 *
 * Throws `InvalidQuantity`, pointers relative to `request`: no path (the voltage has no bound), a path that can't bring the
 * current down, no natural end and no `until_s`, a current beyond what the characteristic knows, or numbers that overflow.
 *
 * Numeric error (the model's own is in `method`); measured in test/physics/transients:
 *
 * | quantity | domain | worst relative error | against |
 * |---|---|---|---|
 * | times, energies, final current; loops of constant inductance | 1e-12 to 1e6 H, 0 to 1e7 Ω, 0.7 V to 1 MV | 2e-15 | mpmath, 50 digits |
 * | the same by quadrature | the same | 2e-15 | the same |
 * | times, energies; saturating loops | from 50 knee currents down, L_d(0)/L_d(∞) to 2e9 | 5e-15 | quadrature over i, mpmath |
 * | times and peak; snubbers of constant inductance | R²C/L from 0 to 4e18, through critical | 1e-15 | mpmath, 80 digits |
 * | times and peak; the same stepped through | the same | 2e-14 | the same |
 * | energies of both | the same | 4e-13 | the same |
 * | current, voltage, peak; saturating snubbers | 7 cases to R²C/L of 4 | 2e-14 of the largest | Taylor integrator, mpmath |
 */
export function transient(inductor: FluxCharacteristic, request: TransientRequest): Transient {
  check(inductor, request);
  const initialCurrent_A = request.event === 'energise' ? 0 : request.initialCurrent_A;
  const source_V = request.source_V ?? 0;
  const initial_J = inductor.energy_J(initialCurrent_A);
  if (!Number.isFinite(initial_J)) throw outOfRange();
  const { course, path, solution } = courseOf(inductor, request, initialCurrent_A, source_V);
  const end = course.at(course.horizon_s);

  const delivered_J = source_V * course.charge;
  const winding_J = request.windingResistance_ohm * course.square;
  const capacitor_J = (path.capacitance_F / 2) * course.capacitorVoltage_V ** 2;
  const path_J = path.constantVoltage_V * course.charge + path.resistance_ohm * course.square + capacitor_J;
  const final_J = inductor.energy_J(bounded(end.current_A, inductor.maximumCurrent_A));
  const residual_J = initial_J - winding_J - path_J + delivered_J - final_J;
  const waveform = waveformOf(course, request.samples ?? DEFAULT_SAMPLES);
  const answer = {
    peakVoltage_V: course.peakVoltage_V,
    timeToSafe_s: course.timeToSafe_s,
    timeToZero_s: course.timeToZero_s,
    finalCurrent_A: end.current_A,
    energy: { initial_J, delivered_J, winding_J, path_J, capacitor_J, final_J, residual_J },
    waveform,
    method: methodOf(inductor, largestCurrent(inductor, waveform.current_A), solution),
  };
  if (!isRepresentable(answer)) throw outOfRange();
  return answer;
}

function check(inductor: FluxCharacteristic, request: TransientRequest): void {
  const { samples = DEFAULT_SAMPLES, until_s } = request;
  if (!Number.isInteger(samples) || samples < 2) {
    throw new InvalidQuantity('/samples', 'a waveform has a whole number of points, 2 or more');
  }
  if (until_s !== undefined && !(until_s > 0)) throw new InvalidQuantity('/until_s', 'must be after the start, at 0 s');
  if (request.event === 'energise') return;
  const { initialCurrent_A, path } = request;
  if (!(initialCurrent_A > 0)) {
    throw new InvalidQuantity('/initialCurrent_A', 'must be positive: there is no current to interrupt');
  }
  if (initialCurrent_A > inductor.maximumCurrent_A) {
    throw new InvalidQuantity(
      '/initialCurrent_A',
      `is beyond ${inductor.maximumCurrent_A} A, where the characteristic of the inductor ends; it is not extrapolated`,
    );
  }
  if (path === undefined) {
    throw new InvalidQuantity(
      '/path',
      'needed: the current of an inductor cannot stop at once, and without a path for it the voltage has no bound; an arc or a breakdown would be the path',
    );
  }
}

/** What the audit has to know of a path; a winding on its own is a path of nothing. */
interface PathTerms {
  readonly constantVoltage_V: number;
  readonly resistance_ohm: number;
  readonly capacitance_F: number;
}

/** How the course is calculated, for the answer's method. */
interface Solution {
  readonly name: string;
  readonly references: readonly string[];
}

function courseOf(
  inductor: FluxCharacteristic,
  request: TransientRequest,
  initialCurrent_A: number,
  source_V: number,
): { course: Course; path: PathTerms; solution: Solution } {
  const { windingResistance_ohm } = request;
  const isLinear = inductor.kind === 'linear';
  const path = request.event === 'interrupt' ? request.path : undefined;
  if (path?.kind === 'snubber') {
    const { resistance_ohm: pathResistance_ohm, capacitance_F } = path;
    const loop = { windingResistance_ohm, initialCurrent_A, source_V, pathResistance_ohm, capacitance_F };
    return {
      course: isLinear
        ? linearSnubberCourse(inductor.differentialInductance_H(0), loop, request)
        : saturatingSnubberCourse(inductor, loop, request),
      path: { constantVoltage_V: 0, resistance_ohm: pathResistance_ohm, capacitance_F },
      solution: isLinear ? CLOSED_RLC : STEPPED_RLC,
    };
  }
  const taken: StaticPath | null = path === undefined ? null : staticPath(path);
  return {
    course: loopCourse(inductor, { windingResistance_ohm, initialCurrent_A, source_V, path: taken }, request),
    path: {
      constantVoltage_V: taken?.constantVoltage_V ?? 0,
      resistance_ohm: taken?.resistance_ohm ?? 0,
      capacitance_F: 0,
    },
    solution: isLinear ? CLOSED_RL : QUADRATURE_RL,
  };
}

const CLOSED_RL: Solution = { name: 'RL circuit, closed form', references: [] };
const QUADRATURE_RL: Solution = {
  name: 'RL circuit of a saturating inductance, quadrature of dλ/(net voltage)',
  references: [],
};
const CLOSED_RLC: Solution = { name: 'series RLC circuit, closed form through critical damping', references: [] };
const STEPPED_RLC: Solution = {
  name: 'series circuit of a saturating inductance, Radau IIA collocation of order 23',
  references: ['E. Hairer, G. Wanner, Solving Ordinary Differential Equations II, 2nd ed. (1996), IV.5'],
};

function largestCurrent({ maximumCurrent_A }: FluxCharacteristic, current_A: readonly number[]): number {
  return current_A.reduce((largest, i) => Math.max(largest, Math.abs(bounded(i, maximumCurrent_A))), 0);
}

function methodOf(inductor: FluxCharacteristic, largestCurrent_A: number, solution: Solution): Method {
  const { name, references, relativeError, validity } = methodAt(inductor, largestCurrent_A);
  return {
    name: `${solution.name}; ${name}`,
    references: [...solution.references, ...references],
    relativeError,
    validity: `lumped circuit with constant resistances; the winding's own capacitance, hysteresis and eddy currents in the core, and the switching time of diode or clamp are neglected; relativeError is that of the flux characteristic at the largest current; ${validity}`,
  };
}

function waveformOf(course: Course, samples: number): Transient['waveform'] {
  const time_s = Array.from({ length: samples }, (_, k) =>
    k === samples - 1 ? course.horizon_s : (course.horizon_s * k) / (samples - 1),
  );
  const points = time_s.map((time) => course.at(time));
  return {
    time_s,
    current_A: points.map(({ current_A }) => current_A),
    voltage_V: points.map(({ voltage_V }) => voltage_V),
  };
}

function isRepresentable({
  peakVoltage_V,
  timeToSafe_s,
  timeToZero_s,
  energy,
  waveform,
}: Omit<Transient, 'method'>): boolean {
  return [
    peakVoltage_V,
    timeToSafe_s ?? 0,
    timeToZero_s ?? 0,
    ...Object.values<number>({ ...energy }),
    ...[waveform.time_s, waveform.current_A, waveform.voltage_V].map((values) =>
      values.every(Number.isFinite) ? 0 : Number.NaN,
    ),
  ].every(Number.isFinite);
}
