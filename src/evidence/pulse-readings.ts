import { linkageAt } from './pulse-curve.ts';
import type { Fit, Readings } from './pulse-fit.ts';

/** The samples of a rising branch, λ from its start and i, in their own units. */
export interface BranchSamples {
  readonly linkage: Float64Array;
  readonly current: Float64Array;
  readonly time: Float64Array;
}

/** Units of λ and i in which a branch's readings lie between 0 and 1. */
export interface Scale {
  readonly linkage: number;
  readonly current: number;
}

export interface ScaledReadings extends Readings {
  /** mean time of each reading's samples */
  readonly time: Float64Array;
  /** samples a reading on average */
  readonly samples: number;
}

/** Largest number of readings: four for each of a spline's intervals at its finest. */
const MOST_READINGS = 320;
/** Readings span at least so many digitising steps of current, so that the stairs of a signal without noise average out. */
const STEPS_ACROSS = 2;

/** Last samples among which the branch's largest current is looked for. */
const LAST = 5;

export function scaleOf({ linkage, current }: BranchSamples): Scale {
  let largest = 0;
  for (const value of linkage) largest = Math.max(largest, value);
  return { linkage: largest, current: Math.max(...current.slice(-LAST)) };
}

/** Few samples as readings of their own, many in even steps of λ. */
export function evenReadings(branch: BranchSamples, scale: Scale): ScaledReadings {
  if (branch.linkage.length <= MOST_READINGS) return everySample(branch, scale);
  const edges = Array.from({ length: MOST_READINGS - 1 }, (_, k) => (k + 1) / MOST_READINGS);
  return grouped(branch, scale, edges);
}

/**
 * Many samples in even steps along a curve already known roughly, none across fewer than two digitising steps of the current: in saturation
 * even steps of λ would be too wide, in the linear part even steps of i.
 */
export function readingsAlong(
  branch: BranchSamples,
  scale: Scale,
  { curve, zeros }: Pick<Fit, 'curve' | 'zeros'>,
  step: number,
): ScaledReadings {
  if (branch.linkage.length <= MOST_READINGS) return everySample(branch, scale);
  const edges: number[] = [];
  let last = 0;
  for (let k = 1; k < MOST_READINGS; k++) {
    const s = k / MOST_READINGS;
    const lambda = linkageAt(curve, s);
    if (2 * s - lambda < last + (STEPS_ACROSS * step) / scale.current) continue;
    last = 2 * s - lambda;
    edges.push(lambda - zeros.shift);
  }
  return grouped(branch, scale, edges);
}

function everySample({ linkage, current, time }: BranchSamples, scale: Scale): ScaledReadings {
  return {
    linkage: linkage.map((value) => value / scale.linkage),
    current: current.map((value) => value / scale.current),
    weight: new Float64Array(linkage.length).fill(1),
    time,
    samples: 1,
  };
}

/** Means of the samples between neighbouring edges of λ, in units of the scale. */
function grouped({ linkage, current, time }: BranchSamples, scale: Scale, edges: readonly number[]): ScaledReadings {
  const groups = edges.length + 1;
  const sums = { linkage: new Float64Array(groups), current: new Float64Array(groups), time: new Float64Array(groups) };
  const counts = new Float64Array(groups);
  let group = 0;
  for (let k = 0; k < linkage.length; k++) {
    const lambda = linkage[k]! / scale.linkage;
    // λ rises but for its noise: the group is the last one's or next to it.
    while (group < groups - 1 && lambda >= edges[group]!) group++;
    while (group > 0 && lambda < edges[group - 1]!) group--;
    sums.linkage[group]! += lambda;
    sums.current[group]! += current[k]! / scale.current;
    sums.time[group]! += time[k]!;
    counts[group]!++;
  }
  const filled = [...counts.keys()].filter((g) => counts[g]! > 0);
  const samples = linkage.length / filled.length;
  const mean = (values: Float64Array) => Float64Array.from(filled, (g) => values[g]! / counts[g]!);
  return {
    linkage: mean(sums.linkage),
    current: mean(sums.current),
    time: mean(sums.time),
    weight: Float64Array.from(filled, (g) => counts[g]! / samples),
    samples,
  };
}
