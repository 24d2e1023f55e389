import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { effectiveDegreesOfFreedom } from '../../src/metrology/degrees-of-freedom.ts';
import { propagate, propagateOverRecord } from '../../src/metrology/propagation.ts';
import { InvalidQuantity } from '../../src/physics/invalid-quantity.ts';

function mean(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}

/** Covariance of the means of two series of simultaneous readings, JCGM 100 equation 17. */
function covarianceOfMeans(a: readonly number[], b: readonly number[]): number {
  const products = a.map((value, k) => (value - mean(a)) * (b[k]! - mean(b)));
  return products.reduce((sum, product) => sum + product, 0) / (a.length * (a.length - 1));
}

function rejection(action: () => unknown): InvalidQuantity {
  try {
    action();
  } catch (error) {
    expect(error).toBeInstanceOf(InvalidQuantity);
    return error as InvalidQuantity;
  }
  throw new Error('was not refused');
}

describe('JCGM 100:2008 annex H.2, simultaneous resistance and reactance (tables H.2 to H.4)', () => {
  const voltage_V = [5.007, 4.994, 5.005, 4.99, 4.999];
  const current_A = [19.663e-3, 19.639e-3, 19.64e-3, 19.685e-3, 19.678e-3];
  const phase_rad = [1.0456, 1.0438, 1.0468, 1.0428, 1.0433];
  const readings = [voltage_V, current_A, phase_rad];
  const u = readings.map((series) => Math.sqrt(covarianceOfMeans(series, series)));
  const correlation = readings.map((a, i) =>
    readings.map((b, j) => (i === j ? 1 : covarianceOfMeans(a, b) / (u[i]! * u[j]!))),
  );
  const inputs = ['V', 'I', 'phi'].map((name, i) => ({
    name,
    value: mean(readings[i]!),
    standardUncertainty: u[i]!,
  }));
  const model = ([V, I, phi]: readonly number[]) => [(V! / I!) * Math.cos(phi!), (V! / I!) * Math.sin(phi!), V! / I!];

  it('input estimates, their uncertainties and correlations', () => {
    expect(inputs[0]!.value).toBeCloseTo(4.999, 4);
    expect(u[0]).toBeCloseTo(0.003209361, 8);
    expect(inputs[1]!.value).toBeCloseTo(19.661e-3, 8);
    expect(u[1]).toBeCloseTo(9.471008e-6, 11);
    expect(inputs[2]!.value).toBeCloseTo(1.04446, 5);
    expect(u[2]).toBeCloseTo(0.0007520638, 9);
    expect(correlation[0]![1]).toBeCloseTo(-0.3553112, 6);
    expect(correlation[1]![2]).toBeCloseTo(-0.6451112, 6);
  });

  it('outputs and their uncertainties', () => {
    const [resistance, , impedance] = propagate(model, inputs, { correlation });
    expect(resistance!.value).toBeCloseTo(127.732, 3);
    expect(Math.abs(resistance!.standardUncertainty - 0.071)).toBeLessThan(0.0005);
    expect(resistance!.standardUncertainty).toBeCloseTo(0.07107141, 8);
    expect(impedance!.value).toBeCloseTo(254.26, 3);
    expect(Math.abs(impedance!.standardUncertainty - 0.236)).toBeLessThan(0.0005);
    expect(impedance!.standardUncertainty).toBeCloseTo(0.2363361, 7);
  });

  it('agrees with the mean of five resistances, one from each set of readings (H.2.4, approach 2)', () => {
    const each = voltage_V.map((V, k) => model([V, current_A[k]!, phase_rad[k]!]));
    const resistances = each.map(([R]) => R!);
    const [resistance] = propagate(model, inputs, { correlation });
    // To the two printed digits: the second approach sees what the first order leaves out.
    const u2 = Math.sqrt(covarianceOfMeans(resistances, resistances));
    expect(Math.abs(resistance!.standardUncertainty - u2)).toBeLessThan(0.0005);
  });

  it('shares of correlated inputs add up to 1', () => {
    for (const { contributions } of propagate(model, inputs, { correlation })) {
      expect(contributions.reduce((sum, { share }) => sum + share, 0)).toBeCloseTo(1, 14);
    }
  });
});

describe('published uncertainty budgets', () => {
  const sum = (inputs: readonly number[]) => inputs.reduce((total, input) => total + input, 0);
  const components = (...u: number[]) =>
    u.map((standardUncertainty, i) => ({ name: `x${i}`, value: 0, standardUncertainty }));

  it('JCGM 100:2008 H.1, end-gauge: u(d) = 9.7 nm with 25.6 degrees of freedom', () => {
    const u = [13 / Math.sqrt(5), 10 / 2.571, 20 / 3];
    expect(propagate(sum, components(...u)).standardUncertainty).toBeCloseTo(9.663, 3);
    const degrees = effectiveDegreesOfFreedom(
      u.map((standardUncertainty, i) => ({ standardUncertainty, degreesOfFreedom: [24, 5, 8][i]! })),
    );
    expect(degrees).toBeCloseTo(25.62085, 5);
    expect(Math.abs(degrees - 25.6)).toBeLessThan(0.06);
  });

  it('JCGM 100:2008 H.1, end-gauge: u(l) = 32 nm with 16 degrees of freedom', () => {
    const u = [25, 9.7, 2.9, 16.6];
    expect(Math.abs(propagate(sum, components(...u)).standardUncertainty - 32)).toBeLessThan(0.5);
    const degrees = effectiveDegreesOfFreedom(
      u.map((standardUncertainty, i) => ({ standardUncertainty, degreesOfFreedom: [18, 25.6, 50, 2][i]! })),
    );
    expect(Math.floor(degrees)).toBe(16);
  });

  it('JCGM 100:2008 H.3, thermometer calibration: straight line through eleven readings', () => {
    const t = [21.521, 22.012, 22.512, 23.003, 23.507, 23.999, 24.513, 25.002, 25.503, 26.01, 26.511].map(
      (x) => x - 20,
    );
    const b = [-0.171, -0.169, -0.166, -0.159, -0.164, -0.165, -0.156, -0.157, -0.159, -0.161, -0.16];
    const line = (readings: readonly number[]) => {
      const slope =
        t.reduce((total, x, k) => total + (x - mean(t)) * readings[k]!, 0) /
        t.reduce((total, x) => total + (x - mean(t)) ** 2, 0);
      return [mean(readings) - slope * mean(t), slope];
    };
    const [y1, y2] = line(b) as [number, number];
    const residuals = b.reduce((total, reading, k) => total + (reading - y1 - y2 * t[k]!) ** 2, 0);
    const s = Math.sqrt(residuals / (b.length - 2));
    const [intercept, slope] = propagate(
      line,
      b.map((value, k) => ({ name: `b${k}`, value, standardUncertainty: s })),
    );
    expect(intercept!.value).toBeCloseTo(-0.1712038, 7);
    expect(slope!.value).toBeCloseTo(0.002182698, 9);
    expect(intercept!.standardUncertainty).toBeCloseTo(0.002877598, 8);
    expect(Math.abs(slope!.standardUncertainty - 0.00067)).toBeLessThan(5e-6);
  });

  it('EA-4/02 supplement S3, 10 kΩ standard resistor: u = 8.33 mΩ', () => {
    const rectangular = (halfWidth: number) => halfWidth / Math.sqrt(3);
    const result = propagate(
      ([standard, drift, temperature, temperatureX, leakage, ratio]: readonly number[]) =>
        (standard! + drift! + temperature!) * leakage! * ratio! - temperatureX!,
      [
        { name: 'standard', value: 10000.053, standardUncertainty: 2.5e-3 },
        { name: 'drift', value: 0.02, standardUncertainty: rectangular(10e-3) },
        { name: 'temperature of the standard', value: 0, standardUncertainty: rectangular(2.75e-3) },
        { name: 'temperature of the resistor', value: 0, standardUncertainty: rectangular(5.5e-3) },
        { name: 'leakage', value: 1, standardUncertainty: 1e-6 / Math.sqrt(6) },
        { name: 'ratio', value: 1.0000105, standardUncertainty: 0.07e-6 },
      ],
    );
    expect(Math.abs(result.standardUncertainty - 8.33e-3)).toBeLessThan(5e-6);
    expect(Math.abs(result.standardUncertainty / 0.008327314 - 1)).toBeLessThan(2e-5);
  });

  it('NIST TN 1900 (Possolo 2015) E13, thermal expansion: 1.7266e-5 /K, u = 1.76e-6 /K', () => {
    const result = propagateOverRecord(
      { length_m: [1.4999, 1.5021], temperature_K: { before: 288.15, after: 373.1 } },
      {
        '/length_m/0': 1e-4,
        '/length_m/1': 2e-4,
        '/temperature_K/before': 0.02,
        '/temperature_K/after': 0.05,
      },
      ({ length_m: [L0, L1], temperature_K: { before, after } }) => ({
        expansion: (L1! - L0!) / (L0! * (after - before)),
      }),
    ).expansion!;
    expect(Math.abs(result.value - 1.7266e-5)).toBeLessThan(5e-10);
    expect(Math.abs(result.standardUncertainty - 1.76e-6)).toBeLessThan(1e-8);
    expect(Math.abs(result.standardUncertainty / 1.755477e-6 - 1)).toBeLessThan(1e-6);
  });
});

describe('shares', () => {
  it('add up to 1 and are zero for exact inputs', () => {
    const positive = fc.double({ min: 1e-3, max: 1e3, noNaN: true });
    const uncertainty = fc.oneof(fc.constant(0), fc.double({ min: 1e-9, max: 1, noNaN: true }));
    fc.assert(
      fc.property(fc.array(fc.tuple(positive, uncertainty), { minLength: 1, maxLength: 6 }), (pairs) => {
        const inputs = pairs.map(([value, relative], i) => ({
          name: `${i}`,
          value,
          standardUncertainty: relative * value,
        }));
        const { standardUncertainty, contributions } = propagate(
          (x) => x.reduce((p, v, i) => p * v ** (i + 1), 1),
          inputs,
        );
        const total = contributions.reduce((sum, { share }) => sum + share, 0);
        expect(Math.abs(total - (pairs.some(([, relative]) => relative > 0) ? 1 : 0))).toBeLessThan(1e-14);
        contributions.forEach((c, i) => {
          if (pairs[i]![1] === 0) expect(c).toMatchObject({ share: 0, standardUncertainty: 0, sensitivity: null });
          const part = Math.sqrt(c.share) * standardUncertainty;
          expect(Math.abs(c.standardUncertainty - part)).toBeLessThan(1e-14 * standardUncertainty + 1e-300);
        });
        // A product of powers: relative uncertainties add in quadrature, weighted by the powers (JCGM 100 equation 12).
        const value = inputs.reduce((p, { value: v }, i) => p * v ** (i + 1), 1);
        const exact = Math.hypot(...pairs.map(([, relative], i) => relative * (i + 1)));
        expect(Math.abs(standardUncertainty / value - exact)).toBeLessThan(1e-9 * exact + 1e-300);
      }),
      { seed: 100, numRuns: 200 },
    );
  });

  it('survive uncertainties whose squares over- or underflow', () => {
    for (const scale of [1e-200, 1e200]) {
      const { standardUncertainty, contributions } = propagate(
        ([a, b]: readonly number[]) => a! + b!,
        [
          { name: 'a', value: 7 * scale, standardUncertainty: 3 * scale },
          { name: 'b', value: 2 * scale, standardUncertainty: 4 * scale },
        ],
      );
      expect(standardUncertainty / scale).toBeCloseTo(5, 10);
      expect(contributions.map(({ share }) => share)).toEqual([expect.closeTo(0.36, 10), expect.closeTo(0.64, 10)]);
    }
  });
});

describe('correlation', () => {
  const inputs = [
    { name: 'a', value: 1, standardUncertainty: 0.3 },
    { name: 'b', value: 2, standardUncertainty: 0.4 },
  ];
  const combined = (sign: number, r: number) =>
    propagate(([a, b]: readonly number[]) => a! + sign * b!, inputs, {
      correlation: [
        [1, r],
        [r, 1],
      ],
    }).standardUncertainty;

  it('adds uncertainties linearly where full, and lets equal ones cancel', () => {
    expect(combined(1, 1)).toBeCloseTo(0.7, 12);
    expect(combined(-1, 1)).toBeCloseTo(0.1, 12);
    expect(combined(1, 0)).toBeCloseTo(0.5, 12);
    const same = [inputs[0]!, { ...inputs[0]!, name: 'b' }];
    const difference = propagate(([a, b]: readonly number[]) => a! - b!, same, {
      correlation: [
        [1, 1],
        [1, 1],
      ],
    });
    expect(difference.standardUncertainty).toBeLessThan(1e-8);
  });

  it.each([
    ['/correlation', [[1]]],
    [
      '/correlation/0/0',
      [
        [0.9, 0],
        [0, 1],
      ],
    ],
    [
      '/correlation/0/1',
      [
        [1, 1.1],
        [1.1, 1],
      ],
    ],
    [
      '/correlation/0/1',
      [
        [1, Number.NaN],
        [0, 1],
      ],
    ],
    [
      '/correlation/0/1',
      [
        [1, 0.2],
        [0.3, 1],
      ],
    ],
  ])('refuses at %s what is no correlation matrix', (pointer, correlation) => {
    expect(rejection(() => propagate(([a]: readonly number[]) => a!, inputs, { correlation })).pointer).toBe(pointer);
  });

  it('refuses correlations that contradict each other', () => {
    const three = [...inputs, { name: 'c', value: 3, standardUncertainty: 0.1 }];
    const correlation = [
      [1, 0.9, -0.9],
      [0.9, 1, 0.9],
      [-0.9, 0.9, 1],
    ];
    expect(rejection(() => propagate(([a]: readonly number[]) => a!, three, { correlation })).pointer).toBe(
      '/correlation',
    );
  });
});

describe('over a record', () => {
  const record = { coil: { diameter_m: 0.03, 'a/b~c': [1, 2, { x: 5 }] }, label: 'choke', current_A: 2 };

  it('reaches numbers through objects, arrays and escaped keys, and leaves the record alone', () => {
    const before = structuredClone(record);
    const outputs = propagateOverRecord(
      record,
      { '/coil/diameter_m': 1e-4, '/coil/a~1b~0c/2/x': 0.5, '/current_A': 0 },
      (r) => ({ area: r.coil.diameter_m ** 2, product: r.current_A * (r.coil['a/b~c'][2] as { x: number }).x }),
    );
    expect(record).toEqual(before);
    expect(outputs.area!.standardUncertainty).toBeCloseTo(2 * 0.03 * 1e-4, 15);
    expect(outputs.area!.contributions.map(({ name, share }) => [name, share])).toEqual([
      ['/coil/diameter_m', 1],
      ['/coil/a~1b~0c/2/x', 0],
      ['/current_A', 0],
    ]);
    expect(outputs.product!.value).toBe(10);
    expect(outputs.product!.standardUncertainty).toBeCloseTo(1, 12);
  });

  it.each([
    ['', '/uncertainty/'],
    ['/label', '/uncertainty/~1label'],
    ['/coil', '/uncertainty/~1coil'],
    ['coil/diameter_m', '/uncertainty/coil~1diameter_m'],
    ['/coil/diameter', '/uncertainty/~1coil~1diameter'],
    ['/coil/a~1b~0c/01', '/uncertainty/~1coil~1a~01b~00c~101'],
    ['/coil/a~1b~0c/3', '/uncertainty/~1coil~1a~01b~00c~13'],
    ['/coil/a~1b~0c/-', '/uncertainty/~1coil~1a~01b~00c~1-'],
    ['/coil/a~1b~0c/length', '/uncertainty/~1coil~1a~01b~00c~1length'],
    ['/label/length', '/uncertainty/~1label~1length'],
    ['/constructor/length', '/uncertainty/~1constructor~1length'],
    ['/__proto__/x', '/uncertainty/~1__proto__~1x'],
    ['/coil/~2', '/uncertainty/~1coil~1~02'],
  ])('refuses %j, which leads to no number', (pointer, at) => {
    const evaluate = () => ({ x: 1 });
    expect(rejection(() => propagateOverRecord(record, { [pointer]: 1 }, evaluate)).pointer).toBe(at);
  });

  it('refuses a negative or infinite uncertainty', () => {
    for (const u of [-1e-9, Number.POSITIVE_INFINITY, Number.NaN]) {
      const refused = rejection(() => propagateOverRecord(record, { '/current_A': u }, () => ({ x: 1 })));
      expect(refused.pointer).toBe('/uncertainty/~1current_A');
    }
  });

  it('passes on what the model itself refuses at the record as given', () => {
    const evaluate = () => {
      throw new InvalidQuantity('/coil/diameter_m', 'no');
    };
    expect(rejection(() => propagateOverRecord(record, { '/current_A': 1 }, evaluate)).pointer).toBe(
      '/coil/diameter_m',
    );
  });

  it('passes on faults that are not about quantities', () => {
    let calls = 0;
    const evaluate = () => {
      if (++calls > 1) throw new TypeError('bug');
      return { x: 1 };
    };
    expect(() => propagateOverRecord(record, { '/current_A': 1 }, evaluate)).toThrow(TypeError);
  });
});

describe('borders of the domain', () => {
  const bounded = (low: number, high: number) => (r: { x: number }) => {
    if (r.x < low || r.x > high) throw new InvalidQuantity('/x', 'outside');
    return { y: Math.exp(r.x) };
  };

  it.each([
    ['central', 0, 2],
    ['central', 1 - 1e-4, 1 + 1e-4],
    ['forward', 1, 2],
    ['backward', 0, 1],
  ])('takes %s differences between %f and %f', (scheme, low, high) => {
    const { y } = propagateOverRecord({ x: 1 }, { '/x': 0.01 }, bounded(low, high));
    expect(y!.contributions[0]!.difference).toBe(scheme);
    expect(Math.abs(y!.contributions[0]!.sensitivity! / Math.E - 1)).toBeLessThan(1e-9);
  });

  it('refuses an input that the model takes no step away from', () => {
    const whole = (r: { turns: number }) => {
      if (!Number.isInteger(r.turns)) throw new InvalidQuantity('/turns', 'whole');
      return { y: r.turns };
    };
    expect(rejection(() => propagateOverRecord({ turns: 7 }, { '/turns': 0.1 }, whole)).pointer).toBe(
      '/uncertainty/~1turns',
    );
  });

  it('counts an output that is missing or not finite as outside, and so does an exclusive minimum', () => {
    const root = propagateOverRecord({ x: 0.01 }, { '/x': 0.01 }, ({ x }) => (x < 0.01 ? {} : { y: x * x }));
    expect(root.y!.contributions[0]).toMatchObject({ difference: 'forward' });
    const seen: number[] = [];
    propagateOverRecord(
      { x: 0.5 },
      { '/x': 2 },
      ({ x }) => {
        seen.push(x);
        return { y: x };
      },
      () => 0,
    );
    expect(Math.min(...seen)).toBeGreaterThan(0);
  });
});
