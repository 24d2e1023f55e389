/** What two coaxial circular filaments do to each other, per µ0: M/µ0 in m, and (dM/dz)/µ0, a pure number. */
export interface FilamentPair {
  mutual: number;
  slope: number;
}

/** Relative difference of the two means below which series take over; they leave out less than 2e-14 of the terms that they stand for. */
const NEARLY_EQUAL = 0.06;

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
  while (a - g > NEARLY_EQUAL * a) {
    c = (a - g) / 2;
    const mean = (a + g) / 2;
    g = Math.sqrt(a * g);
    a = mean;
    sum += weight * c * c;
    weight *= 2;
  }
  // The rest of the sequence in x = c/a of its next term: Σ 2ⁿ⁻¹ cₙ² and the limit, DLMF 19.5.1 and 19.8.6 expanded.
  const inverse = 2 / (a + g);
  c = (c * c * inverse) / 4;
  const x2 = c * inverse * (c * inverse);
  sum += weight * c * c * (1 + x2 * (1 / 8 + x2 * (1 / 16 + x2 * (41 / 1024))));
  const inverseMean = inverse * (1 + x2 * (1 / 4 + x2 * (9 / 64 + x2 * (25 / 256 + x2 * (1225 / 16384)))));
  result.mutual = (Math.PI / 2) * sum * inverseMean;
  if (!withSlope) return;
  result.slope =
    ((-Math.PI / 4) * axialOffset_m * inverseMean * ((product * product) / 2 - (greatest2 + least2) * sum)) /
    (greatest2 * least2);
}
