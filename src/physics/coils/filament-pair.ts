/** What two coaxial circular filaments do to each other, per µ0: M/µ0 in m, and (dM/dz)/µ0, a pure number. */
export interface FilamentPair {
  mutual: number;
  slope: number;
}

/**
 * Writes M/µ0 and, where `withSlope`, (dM/dz)/µ0 of two coaxial filaments into `result`: radius r of the smaller, r + δ of the greater, axial
 * offset z, all in m. Coincident filaments (δ = z = 0) have no finite value.
 *
 * The integrand of the winding sections: it takes the offset δ itself and not two close radii, whose difference would have lost
 * digits in a thin winding; it gives both values from one arithmetic-geometric mean; and it allocates nothing.
 *
 * With a₀ = √((2r + δ)² + z²) and g₀ = √(δ² + z²), the greatest and least distances of two points of the circles, P = a₀² − g₀² =
 * 4r(r + δ), and S = Σₙ₌₁ 2ⁿ⁻¹ cₙ² of that sequence (DLMF 19.8.6), Maxwell's elliptic form (Treatise, 1873, art. 701)
 * and its derivative become
 *
 *     M/µ0 = π S / (2 AGM),     (dM/dz)/µ0 = −π z (P²/2 − (a₀² + g₀²) S) / (4 AGM a₀² g₀²).
 *
 * M is a sum of positive terms. In the slope the bracket is (1/2 − 1/8) P² where the filaments are far apart, and nears
 * P²/K, a small part of P²/2, only logarithmically where they almost touch.
 */
export function filamentPair(
  radius_m: number,
  radialOffset_m: number,
  axialOffset_m: number,
  withSlope: boolean,
  result: FilamentPair,
): void {
  const axial2 = axialOffset_m * axialOffset_m;
  const diameters = 2 * radius_m + radialOffset_m;
  const greatest2 = diameters * diameters + axial2;
  const least2 = radialOffset_m * radialOffset_m + axial2;
  const product = 4 * radius_m * (radius_m + radialOffset_m);
  const greatest = Math.sqrt(greatest2);
  const least = Math.sqrt(least2);
  let a = (greatest + least) / 2;
  let g = Math.sqrt(greatest * least);
  let c = product / (4 * a);
  let sum = c * c;
  let weight = 2;
  // Quadratic convergence: at 1e-7 the next mean is off by (a − g)²/16a², and the c² after the next is nothing.
  while (a - g > 1e-7 * a) {
    c = (a - g) / 2;
    const mean = (a + g) / 2;
    g = Math.sqrt(a * g);
    a = mean;
    sum += weight * c * c;
    weight *= 2;
  }
  const mean = (a + g) / 2;
  c = (c * c) / (4 * mean);
  sum += weight * c * c;
  result.mutual = ((Math.PI / 2) * sum) / mean;
  if (!withSlope) return;
  result.slope =
    ((-Math.PI / 4) * axialOffset_m * ((product * product) / 2 - (greatest2 + least2) * sum)) /
    (mean * greatest2 * least2);
}
