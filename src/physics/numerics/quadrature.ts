/** Nodes in (−1, 1) and weights of a quadrature rule, equal lengths. */
export interface QuadratureRule {
  readonly nodes: Float64Array;
  readonly weights: Float64Array;
}

const rules = new Map<number, QuadratureRule>();

/**
 * Gauss-Legendre rule of `order` points, exact for polynomials of degree 2·order − 1; made once an order and kept.
 * Newton's iteration on P_n from the Chebyshev-like guess of DLMF 18.16.6; weights 2/((1 − x²) P_n'(x)²), DLMF 3.5.23.
 */
export function gaussLegendre(order: number): QuadratureRule {
  const known = rules.get(order);
  if (known) return known;
  const nodes = new Float64Array(order);
  const weights = new Float64Array(order);
  for (let i = 0; i < (order + 1) >> 1; i++) {
    let x = Math.cos((Math.PI * (i + 0.75)) / (order + 0.5));
    let slope = 1;
    for (let step = 0; step < 100; step++) {
      let previous = 1;
      let value = x;
      for (let n = 2; n <= order; n++) [previous, value] = [value, ((2 * n - 1) * x * value - (n - 1) * previous) / n];
      slope = (order * (previous - x * value)) / ((1 - x) * (1 + x));
      const dx = value / slope;
      x -= dx;
      if (Math.abs(dx) <= 1e-16) break;
    }
    const weight = 2 / ((1 - x) * (1 + x) * slope * slope);
    nodes[i] = -x;
    nodes[order - 1 - i] = x;
    weights[i] = weight;
    weights[order - 1 - i] = weight;
  }
  const rule = { nodes, weights };
  rules.set(order, rule);
  return rule;
}

/** ∫ₐᵇ f(x) dx by one Gauss-Legendre panel of `order` points. For smooth f; the caller places the panels. */
export function integrate(f: (x: number) => number, a: number, b: number, order: number): number {
  const { nodes, weights } = gaussLegendre(order);
  const half = (b - a) / 2;
  const middle = (a + b) / 2;
  let sum = 0;
  for (let i = 0; i < order; i++) sum += weights[i]! * f(middle + half * nodes[i]!);
  return sum * half;
}
