/**
 * Flat, equally spaced concentric turns of rectangular section with uniform current: the mutual integral of two closed
 * filaments, averaged over the sections of every pair of turns and summed over all pairs.
 *
 * What closed filaments (circles, polygons) is the caller's: a kernel K(mean, u, v) of their mean radius, the difference u ≥ 0
 * of their radii and the distance v ≥ 0 of their planes, symmetric in the two, analytic but for a logarithm at u = v = 0.
 */
import { gaussLegendre } from '../numerics/quadrature.ts';
import { smoothSum } from '../numerics/smooth-sum.ts';

/** Mutual integral of two concentric filaments, at radii mean ± difference/2 in planes v apart. */
export type FilamentKernel = (mean: number, difference: number, v: number) => number;

/** Section of a track: radial width and axial thickness (0: a strip). */
export interface TrackSection {
  readonly width: number;
  readonly thickness: number;
}

/** Points of a Gauss rule for an interval of half width 1 whose nearest singularity is `distance` from its middle, for 1e-9. */
function order(distance: number): number {
  const ellipse = distance + Math.sqrt(distance * distance - 1);
  return Math.max(2, Math.ceil(10.5 / Math.log(ellipse)));
}

/**
 * Gauss rule of two points in v² for the density 2(t − v)/t², whose moments ⟨v²⟩, ⟨v⁴⟩, ⟨v⁶⟩ are t²/6, t⁴/15, t⁶/28: the nodes
 * (v/t)² are the roots of x² − 31x/49 + 19/490.
 */
const ROOT = Math.sqrt((31 / 49) ** 2 - 38 / 245);
const LOW = Math.sqrt((31 / 49 - ROOT) / 2);
const HIGH = Math.sqrt((31 / 49 + ROOT) / 2);
const HIGH_WEIGHT = (1 / 6 - LOW * LOW) / ROOT;

/**
 * K averaged over the distances v of all pairs of points across the thickness t: density 2(t − v)/t². With v = u sinh τ the
 * logarithm's branch points, v = ±iu, stay π/2 away from the real axis, whether t is a fifth of u or a million times it.
 */
function acrossThickness(kernel: FilamentKernel, mean: number, u: number, thickness: number): number {
  if (thickness === 0) return kernel(mean, u, 0);
  if (thickness < 0.15 * u) {
    return (1 - HIGH_WEIGHT) * kernel(mean, u, LOW * thickness) + HIGH_WEIGHT * kernel(mean, u, HIGH * thickness);
  }
  const half = Math.asinh(thickness / u) / 2;
  const { nodes, weights } = gaussLegendre(3 + Math.ceil(6 * half));
  let sum = 0;
  for (let i = 0; i < nodes.length; i++) {
    const tau = half * (1 + nodes[i]!);
    const v = u * Math.sinh(tau);
    sum += weights[i]! * (1 - v / thickness) * Math.cosh(tau) * kernel(mean, u, v);
  }
  return (2 * half * u * sum) / thickness;
}

/** K averaged over both sections, tracks far enough apart for a product of Gauss rules: `separation` ≥ 2 widths. */
function farPair(kernel: FilamentKernel, mean: number, separation: number, section: TrackSection): number {
  const { width, thickness } = section;
  const { nodes, weights } = gaussLegendre(order((2 * separation) / width - 1));
  let sum = 0;
  for (let i = 0; i < nodes.length; i++) {
    for (let j = 0; j < nodes.length; j++) {
      const average = mean + (width / 4) * (nodes[i]! + nodes[j]!);
      const difference = separation + (width / 2) * (nodes[i]! - nodes[j]!);
      sum += weights[i]! * weights[j]! * acrossThickness(kernel, average, difference, thickness);
    }
  }
  return sum / 4;
}

/**
 * K averaged over both sections of tracks that coincide (separation 0) or are close: over the difference u of the two radii
 * and, for each, the mean radius. From its lower end u runs as x⁶, which draws the sting of the logarithm at u = 0.
 */
function nearPair(kernel: FilamentKernel, mean: number, separation: number, section: TrackSection): number {
  const { width, thickness } = section;
  const radial = gaussLegendre(order(Math.max((2 * mean) / width, 1.06)));
  const across = gaussLegendre(NEAR_ORDER);
  // Mean over the mean radii that go with a difference u, for which there are width − |u − separation|, times their count.
  const atDifference = (u: number, room: number) => {
    let sum = 0;
    for (let i = 0; i < radial.nodes.length; i++) {
      sum += radial.weights[i]! * acrossThickness(kernel, mean + (room / 2) * radial.nodes[i]!, u, thickness);
    }
    return (room / 2) * sum;
  };
  let total = 0;
  for (let i = 0; i < NEAR_ORDER; i++) {
    const x = (1 + across.nodes[i]!) / 2;
    const y = width * x ** 6;
    const jacobian = (across.weights[i]! / 2) * 6 * width * x ** 5;
    if (separation === 0) total += 2 * jacobian * atDifference(y, width - y);
    else {
      total += jacobian * atDifference(separation - width + y, y);
      const u = separation + width * x;
      total += (across.weights[i]! / 2) * width * atDifference(u, width * (1 - x));
    }
  }
  return total / (width * width);
}

/** Points over the difference of radii of near tracks. */
const NEAR_ORDER = 28;

/** K averaged over the sections of two tracks whose centres lie at mean ± separation/2. */
export function trackPair(kernel: FilamentKernel, mean: number, separation: number, section: TrackSection): number {
  return separation >= 2 * section.width
    ? farPair(kernel, mean, separation, section)
    : nearPair(kernel, mean, separation, section);
}

/** Equally spaced tracks: `count` of them, centres at innermost, innermost + pitch, …. */
export interface TrackRow {
  readonly count: number;
  readonly innermost: number;
  readonly pitch: number;
}

/**
 * ΣΣ of `trackPair` over all pairs of a row, each track with itself included. Sums over tracks, and over separations, are
 * taken as sums of a smooth function, so that the cost grows like the square of the logarithm of the count.
 */
export function trackRowSelf(kernel: FilamentKernel, row: TrackRow, section: TrackSection): number {
  const { count, innermost, pitch } = row;
  const atSeparation = (steps: number) => {
    const first = innermost + (steps * pitch) / 2;
    return smoothSum(count - steps, first / pitch, (i) => trackPair(kernel, first + i * pitch, steps * pitch, section));
  };
  return atSeparation(0) + 2 * smoothSum(count - 1, 1, (i) => atSeparation(i + 1));
}

/** Σ of `trackPair` between a row and one more track, one pitch inside its innermost. */
export function trackRowWithNextInside(kernel: FilamentKernel, row: TrackRow, section: TrackSection): number {
  const next = row.innermost - row.pitch;
  return smoothSum(row.count, 1, (i) => {
    const separation = (i + 1) * row.pitch;
    return trackPair(kernel, next + separation / 2, separation, section);
  });
}
