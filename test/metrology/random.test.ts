import { describe, expect, it } from 'vitest';
import { upperTail } from '../../src/metrology/normal.ts';
import { fillNormals, nextBits, streamOf } from '../../src/metrology/random.ts';
import reference from '../fixtures/python/xoshiro128.json' with { type: 'json' };

describe('uniform bits', () => {
  it('are those of xoshiro128++, 2⁶⁴ steps from stream to stream (integers in Python, the jump as a matrix power)', () => {
    for (const { seed, index, bits } of reference.streams) {
      const stream = streamOf(seed, index);
      expect(bits.map(() => nextBits(stream) >>> 0)).toEqual(bits);
    }
  });

  it('start from state 1, 2, 3, 4 as the published reference implementation does', () => {
    const stream = Int32Array.of(1, 2, 3, 4);
    expect(Array.from({ length: 4 }, () => nextBits(stream) >>> 0)).toEqual([641, 1573767, 3222811527, 3517856514]);
  });
});

describe('normal numbers', () => {
  const COUNT = 1 << 18;
  const numbers = new Float64Array(COUNT);
  fillNormals(streamOf(20260131, 0), numbers);

  it('have the moments of the standard normal distribution, within four standard errors', () => {
    const moment = (power: number) => numbers.reduce((sum, x) => sum + x ** power, 0) / COUNT;
    // Standard error of the mean of xⁿ: √((E x²ⁿ − (E xⁿ)²)/N)
    for (const [power, expected, variance] of [
      [1, 0, 1],
      [2, 1, 2],
      [3, 0, 15],
      [4, 3, 96],
      [6, 15, 10395 - 225],
    ] as const) {
      expect(Math.abs(moment(power) - expected) / Math.sqrt(variance / COUNT), `moment ${power}`).toBeLessThan(4);
    }
  });

  it('follow the distribution function (Kolmogorov-Smirnov, 1 %)', () => {
    const sorted = numbers.slice().sort();
    let distance = 0;
    for (let i = 0; i < COUNT; i++) {
      const below = upperTail(-sorted[i]!);
      distance = Math.max(distance, below - i / COUNT, (i + 1) / COUNT - below);
    }
    expect(distance * Math.sqrt(COUNT)).toBeLessThan(1.628);
  });

  it('fill the tails, in and beyond the base layer of the ziggurat', () => {
    const many = new Float64Array(1 << 21);
    fillNormals(streamOf(5, 3), many);
    for (const z of [2, 3, 3.6541, 3.7, 4, 4.5]) {
      for (const side of [1, -1]) {
        const expected = upperTail(z) * many.length;
        let found = 0;
        for (let i = 0; i < many.length; i++) if (side * many[i]! > z) found++;
        expect(Math.abs(found - expected) / Math.sqrt(expected), `${side} × ${z}`).toBeLessThan(4);
      }
    }
  });

  it('are uncorrelated with their neighbours and with the next stream', () => {
    const other = new Float64Array(COUNT);
    fillNormals(streamOf(20260131, 1), other);
    const product = (a: Float64Array, b: Float64Array, lag: number) => {
      let sum = 0;
      for (let i = lag; i < COUNT; i++) sum += a[i]! * b[i - lag]!;
      return Math.abs(sum) / Math.sqrt(COUNT - lag);
    };
    for (const lag of [1, 2, 3, 4, 256]) expect(product(numbers, numbers, lag), `lag ${lag}`).toBeLessThan(4);
    for (const lag of [0, 1, 2]) expect(product(numbers, other, lag), `stream, lag ${lag}`).toBeLessThan(4);
  });

  it('do not depend on how many are drawn at once', () => {
    const [whole, stream] = [new Float64Array(5000), streamOf(9, 2)];
    fillNormals(streamOf(9, 2), whole);
    for (let from = 0; from < 5000; from += 125) {
      const part = new Float64Array(125);
      fillNormals(stream, part);
      expect(part).toEqual(whole.slice(from, from + 125));
    }
  });
});
