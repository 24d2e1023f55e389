import { describe, expect, it } from 'vitest';
import { monteCarloOverRecord, recordModel, resultOf } from '../../src/metrology/monte-carlo.ts';
import { upperTail } from '../../src/metrology/normal.ts';
import { propagateOverRecord } from '../../src/metrology/propagation.ts';
import { BLOCK_SIZE, blocksOf, runBlock } from '../../src/metrology/trials.ts';
import { InvalidQuantity } from '../../src/physics/invalid-quantity.ts';

function rejection(action: () => unknown): InvalidQuantity {
  try {
    action();
  } catch (error) {
    expect(error).toBeInstanceOf(InvalidQuantity);
    return error as InvalidQuantity;
  }
  throw new Error('was not refused');
}

const FOUR = { x: [0, 0, 0, 0] };
const UNIT = { '/x/0': 1, '/x/1': 1, '/x/2': 1, '/x/3': 1 };

describe('published examples', () => {
  it('JCGM 101:2008 9.2.2, sum of four standard normal quantities: u = 2.0, 95 % interval ±3.92', () => {
    const { y } = monteCarloOverRecord(FOUR, UNIT, ({ x }) => ({ y: x[0]! + x[1]! + x[2]! + x[3]! }), {
      trials: 1_000_000,
      seed: 1,
    }).outputs;
    expect(Math.abs(y!.mean)).toBeLessThan(4 * (2 / 1000));
    expect(Math.abs(y!.standardUncertainty - 2)).toBeLessThan(0.005);
    for (const { lower, upper } of [y!.symmetric, y!.shortest]) {
      expect(Math.abs(upper - lower - 2 * 3.919928)).toBeLessThan(0.03);
    }
    expect(Math.abs(y!.symmetric.lower + 3.92)).toBeLessThan(0.015);
    expect(Math.abs(y!.symmetric.upper - 3.92)).toBeLessThan(0.015);
  });

  it('JCGM 101:2008 9.2.3, sum of four rectangular quantities of standard deviation 1: 95 % interval ±3.88', () => {
    // A normal number's own probability is uniformly distributed.
    const rectangular = (z: number) => Math.sqrt(3) * (1 - 2 * upperTail(z));
    const { y } = monteCarloOverRecord(FOUR, UNIT, ({ x }) => ({ y: x.reduce((sum, z) => sum + rectangular(z), 0) }), {
      trials: 400_000,
      seed: 2,
    }).outputs;
    expect(Math.abs(y!.standardUncertainty - 2)).toBeLessThan(0.008);
    expect(Math.abs(y!.symmetric.lower + 3.879407)).toBeLessThan(0.03);
    expect(Math.abs(y!.symmetric.upper - 3.879407)).toBeLessThan(0.03);
  });

  it('NIST TN 1900 (Possolo 2015) E13, thermal expansion: u = 1.76e-6 /K', () => {
    const { expansion } = monteCarloOverRecord(
      { L0: 1.4999, L1: 1.5021, T0: 288.15, T1: 373.1 },
      { '/L0': 1e-4, '/L1': 2e-4, '/T0': 0.02, '/T1': 0.05 },
      ({ L0, L1, T0, T1 }) => ({ expansion: (L1 - L0) / (L0 * (T1 - T0)) }),
      { trials: 400_000, seed: 3 },
    ).outputs;
    expect(Math.abs(expansion!.mean - 1.7266e-5)).toBeLessThan(2e-8);
    expect(Math.abs(expansion!.standardUncertainty - 1.755477e-6)).toBeLessThan(1e-8);
  });

  it('gives the asymmetric intervals of a square (chi-squared, one degree of freedom)', () => {
    const { y } = monteCarloOverRecord({ x: 0 }, { '/x': 1 }, ({ x }) => ({ y: x * x }), {
      trials: 400_000,
      seed: 4,
    }).outputs;
    // Quantiles at 0.025, 0.975 and 0.95 of χ²(1): squares of the normal quantiles at 0.5125, 0.9875 and 0.975.
    expect(Math.abs(y!.symmetric.lower - 0.000982069)).toBeLessThan(5e-5);
    expect(Math.abs(y!.symmetric.upper - 5.02388619)).toBeLessThan(0.05);
    expect(y!.shortest.lower).toBeLessThan(1e-6);
    expect(Math.abs(y!.shortest.upper - 3.84145882)).toBeLessThan(0.04);
  });
});

const RECORD = { coil: { diameter_m: 0.03, length_m: 0.06 }, current_A: 10 };
const UNCERTAINTY = { '/coil/diameter_m': 1e-5, '/coil/length_m': 1e-4, '/current_A': 0.02 };
const evaluate = ({ coil, current_A }: typeof RECORD) => ({
  energy_J: (coil.diameter_m ** 2 / coil.length_m) * current_A ** 2,
  ratio: coil.diameter_m / coil.length_m,
});

describe('agreement', () => {
  it('with first order where the model is nearly linear over the uncertainty', () => {
    const first = propagateOverRecord(RECORD, UNCERTAINTY, evaluate);
    const { outputs, failedTrials } = monteCarloOverRecord(RECORD, UNCERTAINTY, evaluate, { trials: 400_000, seed: 5 });
    expect(failedTrials).toBe(0);
    for (const name of ['energy_J', 'ratio'] as const) {
      const u = first[name]!.standardUncertainty;
      // Standard errors from 400 000 trials: u/632 of the mean, u/894 of u, u/169 of an end of the interval.
      expect(Math.abs(outputs[name]!.mean - first[name]!.value)).toBeLessThan(5e-3 * u);
      expect(Math.abs(outputs[name]!.standardUncertainty / u - 1)).toBeLessThan(5e-3);
      expect(Math.abs(outputs[name]!.symmetric.upper - first[name]!.value - 1.95996 * u)).toBeLessThan(0.02 * u);
      expect(Math.abs(outputs[name]!.symmetric.lower - first[name]!.value + 1.95996 * u)).toBeLessThan(0.02 * u);
    }
  });

  it('keeps digits where the uncertainty is tiny beside the value', () => {
    const { y } = monteCarloOverRecord({ x: 1e9 }, { '/x': 1e-3 }, ({ x }) => ({ y: x }), {
      trials: 100_000,
      seed: 6,
    }).outputs;
    expect(Math.abs(y!.mean - 1e9)).toBeLessThan(2e-5);
    expect(Math.abs(y!.standardUncertainty / 1e-3 - 1)).toBeLessThan(0.01);
  });

  it('survives values whose squares over- or underflow, and none at all', () => {
    for (const scale of [1e-200, 1e200]) {
      const { y } = monteCarloOverRecord({ x: 0 }, { '/x': 1 }, ({ x }) => ({ y: x * scale }), {
        trials: 50_000,
        seed: 7,
      }).outputs;
      expect(Math.abs(y!.standardUncertainty / scale - 1)).toBeLessThan(0.02);
    }
    const { y } = monteCarloOverRecord({ x: 3 }, { '/x': 0 }, ({ x }) => ({ y: x }), { trials: 1000, seed: 8 }).outputs;
    expect(y).toEqual({
      mean: 3,
      standardUncertainty: 0,
      symmetric: { lower: 3, upper: 3 },
      shortest: { lower: 3, upper: 3 },
    });
  });
});

describe('repeatability', () => {
  const options = { trials: 50_000, seed: 42 };

  it('the same seed gives the same answer to the last bit, another one another', () => {
    const answer = monteCarloOverRecord(RECORD, UNCERTAINTY, evaluate, options);
    expect(monteCarloOverRecord(RECORD, UNCERTAINTY, evaluate, options)).toEqual(answer);
    expect(monteCarloOverRecord(RECORD, UNCERTAINTY, evaluate, { ...options, seed: 43 }).outputs).not.toEqual(
      answer.outputs,
    );
  });

  it('does not depend on who runs which block, when', () => {
    const blocks = blocksOf(options.seed, options.trials);
    expect(blocks.map(({ size }) => size)).toEqual([
      BLOCK_SIZE,
      BLOCK_SIZE,
      BLOCK_SIZE,
      options.trials - 3 * BLOCK_SIZE,
    ]);
    const run = (block: (typeof blocks)[number]) => {
      const { model, inputs, outputNames } = recordModel(RECORD, UNCERTAINTY, evaluate);
      return runBlock(model, inputs, outputNames.length, block);
    };
    const backwards = blocks.toReversed().map(run).toReversed();
    expect(resultOf(['energy_J', 'ratio'], backwards, options)).toEqual(
      monteCarloOverRecord(RECORD, UNCERTAINTY, evaluate, options),
    );
  });

  it('leaves the record alone', () => {
    const before = structuredClone(RECORD);
    monteCarloOverRecord(RECORD, UNCERTAINTY, evaluate, { trials: 1000, seed: 0 });
    expect(RECORD).toEqual(before);
  });
});

describe('outputs', () => {
  const answer = ({ coil, current_A }: typeof RECORD) => ({
    method: 'closed form',
    ratio: coil.diameter_m / coil.length_m,
    square: current_A ** 2,
  });

  it('are the numbers of the answer, or those chosen', () => {
    const all = monteCarloOverRecord(RECORD, UNCERTAINTY, answer, { trials: 1000, seed: 11 });
    expect(Object.keys(all.outputs)).toEqual(['ratio', 'square']);
    const { model, inputs, outputNames } = recordModel(RECORD, UNCERTAINTY, answer, undefined, ['square']);
    const samples = runBlock(model, inputs, outputNames.length, { seed: 11, index: 0, size: 1000 });
    const chosen = resultOf(outputNames, [samples], { trials: 1000, seed: 11 });
    expect(chosen.outputs).toEqual({ square: all.outputs.square });
  });
});

describe('trials outside the domain', () => {
  const above = (limit: number) => (r: { x: number }) => {
    if (r.x <= limit) throw new InvalidQuantity('/x', 'too small');
    return { y: r.x };
  };
  const options = { trials: 200_000, seed: 9 };

  it('are counted and left out where they are few', () => {
    const { failedTrials, outputs } = monteCarloOverRecord({ x: 3.5 }, { '/x': 1 }, above(0), options);
    const expected = upperTail(3.5) * options.trials;
    expect(Math.abs(failedTrials - expected)).toBeLessThan(4 * Math.sqrt(expected));
    expect(outputs.y!.symmetric.lower).toBeGreaterThan(0);
  });

  it.each([
    ['too many in all', 2.5],
    ['too many in the first block', 0.5],
  ])('are refused where they are %s', (_, x) => {
    const refused = rejection(() => monteCarloOverRecord({ x }, { '/x': 1 }, above(0), options));
    expect(refused.pointer).toBe('/uncertainty');
    expect(refused.detail).toMatch(/trials had no result/);
  });

  it('are also those whose outputs are not finite, and those at or below an exclusive minimum', () => {
    const root = monteCarloOverRecord({ x: 3.5 }, { '/x': 1 }, ({ x }) => ({ y: Math.sqrt(x), z: x }), options);
    const minimum = monteCarloOverRecord({ x: 3.5 }, { '/x': 1 }, ({ x }) => ({ y: x }), {
      ...options,
      exclusiveMinimum: (pointer) => (pointer === '/x' ? 0 : undefined),
    });
    expect(root.failedTrials).toBeGreaterThan(0);
    expect(minimum.failedTrials).toBe(root.failedTrials);
    expect(root.outputs.z).toEqual(minimum.outputs.y);
  });

  it('are not faults of the program, which come through', () => {
    let calls = 0;
    const faulty = () => {
      if (++calls > 100) throw new TypeError('bug');
      return { y: 1 };
    };
    expect(() => monteCarloOverRecord({ x: 1 }, { '/x': 1 }, faulty, options)).toThrow(TypeError);
  });
});

describe('refuses', () => {
  it.each([
    ['/trials', { trials: 199, seed: 1 }],
    ['/trials', { trials: 1000.5, seed: 1 }],
    ['/trials', { trials: Number.NaN, seed: 1 }],
    ['/trials', { trials: 1000, seed: 1, coverage: 0.9999 }],
    ['/seed', { trials: 1000, seed: -1 }],
    ['/seed', { trials: 1000, seed: 0.5 }],
    ['/coverage', { trials: 1000, seed: 1, coverage: 1 }],
    ['/coverage', { trials: 1000, seed: 1, coverage: 0 }],
  ])('%s of %j', (pointer, options) => {
    expect(rejection(() => monteCarloOverRecord(RECORD, UNCERTAINTY, evaluate, options)).pointer).toBe(pointer);
  });

  it('pointers that lead to no number', () => {
    const refused = rejection(() => monteCarloOverRecord(RECORD, { '/coil': 1 }, evaluate, { trials: 1000, seed: 1 }));
    expect(refused.pointer).toBe('/uncertainty/~1coil');
  });
});
