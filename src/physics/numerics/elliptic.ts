/**
 * Complete elliptic integrals, by Carlson's symmetric forms and the arithmetic-geometric mean.
 *
 * Sources: B. C. Carlson, "Numerical computation of real or complex elliptic integrals", Numerical Algorithms 10 (1995) 13-26;
 * NIST Digital Library of Mathematical Functions, 19.2, 19.8, 19.25 (https://dlmf.nist.gov/19).
 *
 * Every function takes the **complementary modulus** k' = √(1 − k²), 0 < k' ≤ 1, and not k: near k = 1, where coaxial windings
 * almost touch, k' is what geometry gives exactly (a ratio of distances) and 1 − k² would have lost it.
 *
 * | function     | domain                                                     | worst relative error | against           |
 * |--------------|------------------------------------------------------------|----------------------|-------------------|
 * | K, E, K − E  | k' from 1e-300 to 1                                        | 1e-15                | mpmath, 60 digits |
 * | K − E        | k² given, down to 1e-58                                    | 1e-15                | mpmath, 60 digits |
 * | R_F, R_D     | arguments from 1e-8 to 1e8, first one also zero            | 2e-15, 3e-15         | mpmath, 60 digits |
 * | cel          | k' from 1e-10 to 1, p from 1e-6 to 1e6, a and b positive   | 3e-15                | mpmath, 60 digits |
 */

/**
 * The descending AGM sequence from (1, k') with c₀² = k²: its limit, and Σₙ₌₁ 2ⁿ⁻¹ cₙ², what K and E are both made from.
 *
 * cₙ₊₁ = (aₙ − gₙ)/2 = cₙ²/(4aₙ₊₁). The first and the last c are taken by the second expression, which keeps its digits
 * however small k is; those between by the first, which does not pass an error on from step to step.
 */
function descend(complementaryModulus: number, modulusSquared: number): { mean: number; weightedSquares: number } {
  let a = (1 + complementaryModulus) / 2;
  let g = Math.sqrt(complementaryModulus);
  let c = modulusSquared / (4 * a);
  let weightedSquares = c * c;
  let weight = 2;
  // Quadratic convergence: below 1e-8 the c² after the next is under one unit in the last place.
  while (a - g > 1e-8 * a) {
    c = (a - g) / 2;
    const mean = (a + g) / 2;
    g = Math.sqrt(a * g);
    a = mean;
    weightedSquares += weight * c * c;
    weight *= 2;
  }
  const mean = (a + g) / 2;
  c = (c * c) / (4 * mean);
  return { mean, weightedSquares: weightedSquares + weight * c * c };
}

function modulusSquaredOf(complementaryModulus: number): number {
  return (1 - complementaryModulus) * (1 + complementaryModulus);
}

/** K(k) = ∫₀^{π/2} dθ/√(1 − k² sin²θ), DLMF 19.8.5; Infinity at k' = 0. */
export function ellipticK(complementaryModulus: number): number {
  if (complementaryModulus === 0) return Infinity;
  return Math.PI / (2 * descend(complementaryModulus, modulusSquaredOf(complementaryModulus)).mean);
}

/**
 * K(k) − E(k), every term positive, so no cancellation however small k is: K·Σₙ₌₀ 2ⁿ⁻¹ cₙ² (DLMF 19.8.6), with
 * c₀² = k² = (1 − k')(1 + k') passed in exactly as `modulusSquared` where the caller knows it better than 1 − k'².
 * Infinity at k' = 0.
 */
export function ellipticKMinusE(
  complementaryModulus: number,
  modulusSquared = modulusSquaredOf(complementaryModulus),
): number {
  return ellipticKAndKMinusE(complementaryModulus, modulusSquared).kMinusE;
}

/** K and K − E together, as above, for the price of one. */
export function ellipticKAndKMinusE(
  complementaryModulus: number,
  modulusSquared = modulusSquaredOf(complementaryModulus),
): { k: number; kMinusE: number } {
  if (complementaryModulus === 0) return { k: Infinity, kMinusE: Infinity };
  const { mean, weightedSquares } = descend(complementaryModulus, modulusSquared);
  const k = Math.PI / (2 * mean);
  return { k, kMinusE: k * (modulusSquared / 2 + weightedSquares) };
}

/**
 * E(k) = ∫₀^{π/2} √(1 − k² sin²θ) dθ. Near k = 1 as K − E would cancel, so E = k'²·(R_D(0, k'², 1) + R_D(0, 1, k'²))/3,
 * DLMF 19.25.1, and below k' = 1e-9 the limit 1, which E = 1 + k'²(ln(4/k') − 1/2)/2 + … has then reached.
 */
export function ellipticE(complementaryModulus: number): number {
  if (complementaryModulus < 1e-9) return 1;
  const q = complementaryModulus * complementaryModulus;
  if (q > 0.1) {
    const modulusSquared = modulusSquaredOf(complementaryModulus);
    const { mean, weightedSquares } = descend(complementaryModulus, modulusSquared);
    return (Math.PI / (2 * mean)) * (1 - modulusSquared / 2 - weightedSquares);
  }
  return (q * (carlsonRD(0, q, 1) + carlsonRD(0, 1, q))) / 3;
}

/** Carlson's R_F(x, y, z), at most one argument zero, the others positive. */
export function carlsonRF(x: number, y: number, z: number): number {
  const mean0 = (x + y + z) / 3;
  const spread = Math.max(Math.abs(mean0 - x), Math.abs(mean0 - y), Math.abs(mean0 - z));
  let [a, b, c] = [x, y, z];
  let mean = mean0;
  let scale = 1;
  while (spread * scale * 350 > Math.abs(mean)) {
    const lambda = Math.sqrt(a) * (Math.sqrt(b) + Math.sqrt(c)) + Math.sqrt(b) * Math.sqrt(c);
    [a, b, c] = [(a + lambda) / 4, (b + lambda) / 4, (c + lambda) / 4];
    mean = (mean + lambda) / 4;
    scale /= 4;
  }
  const u = ((mean0 - x) * scale) / mean;
  const v = ((mean0 - y) * scale) / mean;
  const w = -(u + v);
  const e2 = u * v - w * w;
  const e3 = u * v * w;
  return (1 - e2 / 10 + e3 / 14 + (e2 * e2) / 24 - (3 * e2 * e3) / 44) / Math.sqrt(mean);
}

/** Carlson's R_D(x, y, z): z positive, at most one of x and y zero. */
export function carlsonRD(x: number, y: number, z: number): number {
  const mean0 = (x + y + 3 * z) / 5;
  const spread = Math.max(Math.abs(mean0 - x), Math.abs(mean0 - y), Math.abs(mean0 - z));
  let [a, b, c] = [x, y, z];
  let mean = mean0;
  let scale = 1;
  let sum = 0;
  while (spread * scale * 420 > Math.abs(mean)) {
    const [ra, rb, rc] = [Math.sqrt(a), Math.sqrt(b), Math.sqrt(c)];
    const lambda = ra * (rb + rc) + rb * rc;
    sum += scale / (rc * (c + lambda));
    [a, b, c] = [(a + lambda) / 4, (b + lambda) / 4, (c + lambda) / 4];
    mean = (mean + lambda) / 4;
    scale /= 4;
  }
  const u = ((mean0 - x) * scale) / mean;
  const v = ((mean0 - y) * scale) / mean;
  const w = -(u + v) / 3;
  const e2 = u * v - 6 * w * w;
  const e3 = (3 * u * v - 8 * w * w) * w;
  const e4 = 3 * (u * v - w * w) * w * w;
  const e5 = u * v * w * w * w;
  const series = 1 - (3 * e2) / 14 + e3 / 6 + (9 * e2 * e2) / 88 - (3 * e4) / 22 - (9 * e2 * e3) / 52 + (3 * e5) / 26;
  return (scale * series) / (mean * Math.sqrt(mean)) + 3 * sum;
}

/**
 * Bulirsch's general complete elliptic integral
 * cel(k', p, a, b) = ∫₀^{π/2} (a cos²θ + b sin²θ) / (cos²θ + p sin²θ) / √(cos²θ + k'² sin²θ) dθ, for p > 0.
 * Π(n, k) = cel(k', 1 − n, 1, 1). DLMF 19.2.11; R. Bulirsch, Numerische Mathematik 13 (1969) 305-315.
 */
export function bulirschCel(complementaryModulus: number, p: number, a: number, b: number): number {
  let kc = Math.abs(complementaryModulus);
  let e = kc;
  let m = 1;
  let q = Math.sqrt(p);
  let aa = a;
  let bb = b / q;
  let f = aa;
  aa += bb / q;
  let g = e / q;
  bb = 2 * (bb + f * g);
  q += g;
  g = m;
  m += kc;
  while (Math.abs(g - kc) > 1e-8 * g) {
    kc = 2 * Math.sqrt(e);
    e = kc * m;
    f = aa;
    aa += bb / q;
    g = e / q;
    bb = 2 * (bb + f * g);
    q += g;
    g = m;
    m += kc;
  }
  return ((Math.PI / 2) * (bb + aa * m)) / (m * (m + q));
}
