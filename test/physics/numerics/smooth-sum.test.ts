import { describe, expect, it } from 'vitest';
import { smoothSum } from '../../../src/physics/numerics/smooth-sum.ts';

/** Term by term, with Kahan's compensation. */
function termByTerm(count: number, f: (index: number) => number): number {
  let sum = 0;
  let lost = 0;
  for (let i = 0; i < count; i++) {
    const term = f(i) - lost;
    const next = sum + term;
    lost = next - sum - term;
    sum = next;
  }
  return sum;
}

describe('sum of a smooth function', () => {
  const functions: [string, (x: number) => number][] = [
    ['1/x', (x) => 1 / x],
    ['ln x', Math.log],
    ['√x', Math.sqrt],
    ['x ln x', (x) => x * Math.log(x)],
  ];
  for (const [name, g] of functions) {
    it(`of ${name} agrees with the sum term by term`, () => {
      for (const distance of [1, 2.5, 1000]) {
        for (const count of [1, 31, 32, 33, 127, 1000, 4095, 200_000]) {
          const f = (i: number) => g(distance + i);
          const exact = termByTerm(count, f);
          if (exact !== 0) expect(Math.abs(smoothSum(count, distance, f) / exact - 1)).toBeLessThan(5e-11);
        }
      }
    });
  }

  it('is nought of nothing and asks for few values of many', () => {
    let asked = 0;
    expect(smoothSum(0, 1, () => 1)).toBe(0);
    smoothSum(1_000_000, 1, () => ++asked);
    expect(asked).toBeLessThan(400);
  });
});
