/** A component of a combined standard uncertainty; Infinity degrees of freedom for one that is itself known exactly. */
export interface Component {
  readonly standardUncertainty: number;
  readonly degreesOfFreedom: number;
}

/**
 * Effective degrees of freedom of the root sum of squares of independent components, by the Welch-Satterthwaite
 * formula, JCGM 100:2008 equation G.2b: ν = u⁴ / Σ uᵢ⁴/νᵢ. Infinity where no component has a finite number. Not
 * truncated to an integer.
 */
export function effectiveDegreesOfFreedom(components: readonly Component[]): number {
  const combined = Math.hypot(...components.map(({ standardUncertainty }) => standardUncertainty));
  if (combined === 0) return Number.POSITIVE_INFINITY;
  const sum = components.reduce(
    (total, { standardUncertainty, degreesOfFreedom }) =>
      total + (standardUncertainty / combined) ** 4 / degreesOfFreedom,
    0,
  );
  return 1 / sum;
}
