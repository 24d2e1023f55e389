import { InvalidQuantity } from './invalid-quantity.ts';

/** Linear inductors that share flux: `inductanceMatrix_H` has the self-inductances on its diagonal, the mutual ones beside it. */
export interface CoupledInductors {
  readonly inductanceMatrix_H: readonly (readonly number[])[];
  readonly current_A: readonly number[];
}

/**
 * Energy in J that the inductors store together and the flux linkage in Wb of each.
 *
 *     W = ½ iᵀ L i,   λ = L i
 *
 * The energy is summed from squares, by L = S P (U D Uᵀ) Pᵀ S with Sᵢ = √Lᵢᵢ and a pivoted U D Uᵀ of what is then the matrix of
 * coupling coefficients (N. J. Higham, Accuracy and Stability of Numerical Algorithms, 2nd ed., 2002, ch. 10): it is never negative,
 * inductors of any sizes may be mixed, and opposed currents in tightly coupled inductors cancel no more than the coupling says.
 *
 * A passive set can't store negative energy, so the matrix must be positive semidefinite; perfect coupling, the limit, is allowed
 * within 1e-12. Throws `InvalidQuantity` at the matrix, its row or its element where it is not square, not symmetric or not
 * positive semidefinite, naming the pair that is coupled beyond 1 or the currents that would store negative energy; at
 * `/current_A` where there is not one current for each inductor or the energy leaves the range of a number.
 *
 * | inductors        | self-inductances       | worst error, relative to ½ Σ of the magnitudes of the terms | against          |
 * |------------------|------------------------|--------------------------------------------------------------|------------------|
 * | 1 to 6, any rank | 1 nH to 1 kH, mixed    | 2e-15                                                        | exact arithmetic |
 */
export function coupledInductorsEnergy(inductors: CoupledInductors): { energy_J: number; fluxLinkage_Wb: number[] } {
  const { inductanceMatrix_H: matrix, current_A } = inductors;
  checkSquare(matrix);
  if (current_A.length !== matrix.length) {
    throw new InvalidQuantity('/current_A', `must have ${matrix.length} currents, one for each row of the matrix`);
  }
  checkSymmetric(matrix);
  const roots = matrix.map((row, i) => rootOfSelfInductance(row[i]!, i));
  const coupling = matrix.map((row, i) => row.map((_, j) => couplingCoefficient(matrix, roots, i, j)));
  const factors = factorise(coupling, roots);
  const scaledCurrents = factors.order.map((i) => roots[i]! * current_A[i]!);
  let energy_J = 0;
  factors.pivots.forEach((pivot, k) => {
    const along = factors.columns[k]!.reduce((sum, u, i) => sum + u * scaledCurrents[i]!, 0);
    energy_J += (pivot * along * along) / 2;
  });
  const fluxLinkage_Wb = matrix.map((row, i) =>
    row.reduce((sum, element, j) => sum + ((element + matrix[j]![i]!) / 2) * current_A[j]!, 0),
  );
  if (!Number.isFinite(energy_J) || !fluxLinkage_Wb.every(Number.isFinite)) {
    throw new InvalidQuantity('/current_A', 'gives an energy outside the range of a number');
  }
  return { energy_J, fluxLinkage_Wb };
}

/** Rounding that mirrored elements, and couplings of 1, may carry: what twelve printed digits leave. */
const TOLERANCE = 1e-12;

function element(i: number, j: number): string {
  return `/inductanceMatrix_H/${i}/${j}`;
}

function checkSquare(matrix: readonly (readonly number[])[]): void {
  if (matrix.length === 0) throw new InvalidQuantity('/inductanceMatrix_H', 'must have at least one row');
  matrix.forEach((row, i) => {
    if (row.length !== matrix.length) {
      throw new InvalidQuantity(
        `/inductanceMatrix_H/${i}`,
        `must have ${matrix.length} elements, as many as there are rows: the matrix is square`,
      );
    }
  });
}

function checkSymmetric(matrix: readonly (readonly number[])[]): void {
  matrix.forEach((row, i) => {
    for (let j = 0; j < i; j++) {
      const [lower, upper] = [row[j]!, matrix[j]![i]!];
      if (Math.abs(lower - upper) > TOLERANCE * Math.max(Math.abs(lower), Math.abs(upper))) {
        throw new InvalidQuantity(
          element(i, j),
          `is ${lower} H, but the mutual inductance of the same pair at ${element(j, i)} is ${upper} H: the matrix is symmetric`,
        );
      }
    }
  });
}

function rootOfSelfInductance(selfInductance_H: number, i: number): number {
  if (selfInductance_H < 0) throw new InvalidQuantity(element(i, i), 'is a self-inductance and cannot be negative');
  return Math.sqrt(selfInductance_H);
}

function couplingCoefficient(
  matrix: readonly (readonly number[])[],
  roots: readonly number[],
  i: number,
  j: number,
): number {
  if (i === j) return roots[i] === 0 ? 0 : 1;
  const mutual = (matrix[i]![j]! + matrix[j]![i]!) / 2;
  if (mutual === 0) return 0;
  if (roots[i] === 0 || roots[j] === 0) {
    throw new InvalidQuantity(element(i, j), 'couples an inductor that has no self-inductance');
  }
  const coupling = mutual / roots[i]! / roots[j]!;
  if (Math.abs(coupling) > 1 + TOLERANCE) {
    throw new InvalidQuantity(
      element(i, j),
      `couples inductors ${i} and ${j} by ${coupling}: the mutual inductance of ${mutual} H exceeds √(L${i}·L${j}) = ${roots[i]! * roots[j]!} H`,
    );
  }
  return coupling;
}

interface Factors {
  readonly order: readonly number[];
  readonly pivots: readonly number[];
  /** Column k of U, in the pivoted order: 0 above its own place, 1 in it. */
  readonly columns: readonly (readonly number[])[];
}

/** Outer-product U D Uᵀ with the largest remaining diagonal element as the next pivot; `coupling` has a unit diagonal. */
function factorise(coupling: readonly (readonly number[])[], roots: readonly number[]): Factors {
  const size = coupling.length;
  const rest = coupling.map((row) => [...row]);
  const order = rest.map((_, i) => i);
  const pivots: number[] = [];
  const columns: number[][] = [];
  for (let k = 0; k < size; k++) {
    let largest = k;
    for (let i = k; i < size; i++) if (diagonal(rest, order[i]!) > diagonal(rest, order[largest]!)) largest = i;
    const pivot = diagonal(rest, order[largest]!);
    if (pivot <= TOLERANCE) break;
    [order[k], order[largest]] = [order[largest]!, order[k]!];
    for (const column of columns) [column[k], column[largest]] = [column[largest]!, column[k]!];
    const column = order.map((i, at) => (at < k ? 0 : rest[i]![order[k]!]! / pivot));
    for (let i = k + 1; i < size; i++) {
      for (let j = k + 1; j < size; j++) rest[order[i]!]![order[j]!]! -= column[i]! * column[j]! * pivot;
    }
    pivots.push(pivot);
    columns.push(column);
  }
  refuseNegativeRest(rest, order, { order, pivots, columns }, roots);
  return { order, pivots, columns };
}

function diagonal(matrix: readonly (readonly number[])[], i: number): number {
  return matrix[i]![i]!;
}

/**
 * What the pivots leave has no positive diagonal element; a semidefinite matrix leaves nothing. A negative element on the
 * diagonal, or any beside it, gives currents of negative energy: w in the rest, and Uᵀ(v, w) = 0 for those before it.
 */
function refuseNegativeRest(
  rest: readonly (readonly number[])[],
  order: readonly number[],
  { pivots, columns }: Factors,
  roots: readonly number[],
): void {
  const rank = pivots.length;
  const size = order.length;
  const direction = new Array<number>(size).fill(0);
  let energy = 0;
  for (let i = rank; i < size; i++) {
    for (let j = rank; j <= i; j++) {
      const [a, b] = [order[i]!, order[j]!];
      const value = i === j ? diagonal(rest, a) : diagonal(rest, a) + diagonal(rest, b) - 2 * Math.abs(rest[a]![b]!);
      if (value < energy) {
        energy = value;
        direction.fill(0);
        direction[j] = i === j ? 1 : -Math.sign(rest[a]![b]!);
        direction[i] = 1;
      }
    }
  }
  if (energy >= -TOLERANCE * size) return;
  for (let k = rank - 1; k >= 0; k--) {
    for (let i = k + 1; i < size; i++) direction[k]! -= columns[k]![i]! * direction[i]!;
  }
  const current = new Array<number>(size).fill(0);
  order.forEach((i, at) => {
    current[i] = roots[i] === 0 ? 0 : direction[at]! / roots[i]!;
  });
  const largest = Math.max(...current.map(Math.abs));
  const shown = current.map((value) => Number((value / largest).toPrecision(6)));
  const energy_J = energy / 2 / largest / largest;
  throw new InvalidQuantity(
    '/inductanceMatrix_H',
    `is not positive semidefinite: currents of ${JSON.stringify(shown)} A would store ${energy_J.toPrecision(3)} J, and no set of coils stores negative energy`,
  );
}
