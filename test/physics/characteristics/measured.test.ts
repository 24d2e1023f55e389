import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { coredCharacteristic } from '../../../src/physics/characteristics/cored.ts';
import { measuredCharacteristic, type Sweep } from '../../../src/physics/characteristics/measured.ts';
import { integrate } from '../../../src/physics/numerics/quadrature.ts';

const relative = (value: number, truth: number) => (truth === 0 ? Math.abs(value) : Math.abs(value / truth - 1));
const KINDS = ['differential', 'apparent'] as const;

/** Saturating inductors in closed form: λ = L∞·i + Λ·f(ΔL·i/Λ), and with F = ∫ f its co-energy ½·L∞·i² + Λ²/ΔL·F. */
const LAWS = {
  'hyperbolic-tangent': {
    f: Math.tanh,
    slope: (x: number) => Math.cosh(x) ** -2,
    integral: (x: number) => Math.log(Math.cosh(x)),
  },
  arctangent: {
    f: (x: number) => (2 / Math.PI) * Math.atan((Math.PI * x) / 2),
    slope: (x: number) => 1 / (1 + ((Math.PI * x) / 2) ** 2),
    integral: (x: number) =>
      (2 / Math.PI) * (x * Math.atan((Math.PI * x) / 2) - Math.log1p(((Math.PI * x) / 2) ** 2) / Math.PI),
  },
  froehlich: {
    f: (x: number) => x / (1 + x),
    slope: (x: number) => (1 + x) ** -2,
    integral: (x: number) => x - Math.log1p(x),
  },
};
const [LINF, DL, LAMBDA] = [1e-5, 1e-3, 1e-2];

function analytic(law: keyof typeof LAWS) {
  const { f, slope, integral } = LAWS[law];
  const linkage = (i: number) => LINF * i + LAMBDA * f((DL * i) / LAMBDA);
  const differential = (i: number) => LINF + DL * slope((DL * i) / LAMBDA);
  const coenergy = (i: number) => (LINF * i * i) / 2 + (LAMBDA ** 2 / DL) * integral((DL * i) / LAMBDA);
  let half = 1;
  while (differential(half) > differential(0) / 2) half *= 1.001;
  return { linkage, differential, energy: (i: number) => i * linkage(i) - coenergy(i), half };
}

function sweepOf(
  kind: Sweep['kind'],
  current_A: number[],
  { linkage, differential }: ReturnType<typeof analytic>,
): Sweep {
  const apparent = (i: number) => (i === 0 ? differential(0) : linkage(i) / i);
  return { kind, current_A, inductance_H: current_A.map(kind === 'apparent' ? apparent : differential) };
}

const equally = (readings: number, top: number) =>
  Array.from({ length: readings }, (_, k) => (top * k) / (readings - 1));

describe('accuracy from few readings of analytic saturating curves', () => {
  // readings, then worst relative error of λ and of energy (from top/50 up), and of dλ/di in its value at zero
  it.each([
    ['differential', 6, 5e-2, 6e-2, 6e-2],
    ['differential', 10, 2e-3, 2e-3, 4e-3],
    ['differential', 20, 8e-5, 2e-4, 4e-4],
    ['differential', 50, 3e-6, 4e-6, 8e-6],
    ['apparent', 6, 2e-2, 3e-2, 3e-2],
    ['apparent', 10, 3e-3, 3e-3, 4e-3],
    ['apparent', 20, 2e-4, 3e-4, 8e-4],
    ['apparent', 50, 8e-6, 8e-6, 4e-5],
  ] as const)('%s, %d readings', (kind, readings, linkageLimit, energyLimit, slopeLimit) => {
    for (const law of Object.keys(LAWS) as (keyof typeof LAWS)[]) {
      const truth = analytic(law);
      for (const span of [1, 2, 4]) {
        const top = span * truth.half;
        const c = measuredCharacteristic(sweepOf(kind, equally(readings, top), truth));
        const worst = { linkage: 0, energy: 0, slope: 0 };
        for (let k = 1; k <= 500; k++) {
          const i = (top * k) / 500;
          const slopeError = c.differentialInductance_H(i) - truth.differential(i);
          worst.linkage = Math.max(worst.linkage, relative(c.fluxLinkage_Wb(i), truth.linkage(i)));
          worst.slope = Math.max(worst.slope, Math.abs(slopeError) / truth.differential(0));
          if (k >= 10) worst.energy = Math.max(worst.energy, relative(c.energy_J(i), truth.energy(i)));
        }
        expect(worst.linkage).toBeLessThan(linkageLimit);
        expect(worst.energy).toBeLessThan(energyLimit);
        expect(worst.slope).toBeLessThan(slopeLimit);
      }
    }
  });

  it('is far from ½·L·i² where the part saturates, and the sweep knows it', () => {
    const truth = analytic('hyperbolic-tangent');
    const top = 3 * truth.half;
    const c = measuredCharacteristic(sweepOf('differential', equally(20, top), truth));
    expect(relative(c.energy_J(top), truth.energy(top))).toBeLessThan(1e-3);
    expect(((truth.differential(0) / 2) * top ** 2) / truth.energy(top)).toBeGreaterThan(2);
  });

  it('the stated error covers the true one in nineteen of twenty sweeps of ten readings, sharp knees included', () => {
    let [covered, all] = [0, 0];
    for (const magnetisation of ['hyperbolic-tangent', 'arctangent', 'froehlich'] as const) {
      for (const length_m of [0, 2e-4, 1e-3]) {
        const truth = coredCharacteristic({
          shape: 'cored',
          turns: 30,
          core: {
            effectiveArea_m2: 1e-4,
            effectiveLength_m: 0.1,
            material: { initialPermeability: 2000, saturation: { fluxDensity_T: 0.4 }, magnetisation },
            gap: { length_m },
          },
        });
        let half = 1e-3;
        while (truth.differentialInductance_H(half) > truth.differentialInductance_H(0) / 2) half *= 1.001;
        for (const span of [0.7, 1, 2, 4]) {
          const current_A = equally(10, span * half);
          for (const kind of KINDS) {
            const read = kind === 'apparent' ? truth.apparentInductance_H : truth.differentialInductance_H;
            const c = measuredCharacteristic({ kind, current_A, inductance_H: current_A.map(read) });
            const error = Math.max(
              ...equally(101, current_A.at(-1)!).map((i) => relative(c.fluxLinkage_Wb(i), truth.fluxLinkage_Wb(i))),
              ...current_A.slice(1).map((i) => relative(c.energy_J(i), truth.energy_J(i))),
            );
            all += 1;
            if (error <= c.method.relativeError) covered += 1;
          }
        }
      }
    }
    expect(all).toBe(72);
    expect(covered / all).toBeGreaterThanOrEqual(0.95);
  });
});

describe.each(KINDS)('%s sweep', (kind) => {
  const truth = analytic('arctangent');
  const current = [0, 2, 5, 6, 8, 12, 13, 20];
  const sweep = sweepOf(kind, current, truth);
  const c = measuredCharacteristic(sweep);

  it('gives its readings back', () => {
    current.forEach((i, k) => {
      const read = kind === 'apparent' ? c.apparentInductance_H(i) : c.differentialInductance_H(i);
      expect(relative(read, sweep.inductance_H[k]!)).toBeLessThan(1e-15);
    });
  });

  it('is odd, rises, and dλ/di is its slope', () => {
    let before = 0;
    for (let i = 0.05; i < 20; i += 0.05) {
      const linkage = c.fluxLinkage_Wb(i);
      expect(linkage).toBeGreaterThan(before);
      before = linkage;
      expect(c.fluxLinkage_Wb(-i)).toBe(-linkage);
      expect(c.energy_J(-i)).toBe(c.energy_J(i));
      const difference = (c.fluxLinkage_Wb(i + 1e-6) - c.fluxLinkage_Wb(i - 1e-6)) / 2e-6;
      expect(relative(difference, c.differentialInductance_H(i))).toBeLessThan(1e-6);
    }
  });

  it('energy + co-energy = i·λ, and both are the integrals, by quadrature', () => {
    let [energy, coenergy, from] = [0, 0, 0];
    for (const to of current.slice(1)) {
      energy += integrate((i) => i * c.differentialInductance_H(i), from, to, 8);
      coenergy += integrate((i) => c.fluxLinkage_Wb(i), from, to, 8);
      from = to;
      expect(relative(c.energy_J(to), energy)).toBeLessThan(1e-14);
      expect(relative(c.coenergy_J(to), coenergy)).toBeLessThan(1e-14);
      expect(relative(c.energy_J(to) + c.coenergy_J(to), to * c.fluxLinkage_Wb(to))).toBeLessThan(1e-14);
    }
  });

  it('the inverse gives the current back', () => {
    for (const i of [1e-30, 1e-6, 0.3, 2, 4.4, 12, 19.9, 20]) {
      expect(relative(c.current_A(c.fluxLinkage_Wb(i)), i)).toBeLessThan(1e-14);
      expect(relative(c.current_A(-c.fluxLinkage_Wb(i)), -i)).toBeLessThan(1e-14);
    }
    expect(c.current_A(0)).toBe(0);
  });

  it('ends at the last reading', () => {
    expect(c.maximumCurrent_A).toBe(20);
    for (const use of [
      c.fluxLinkage_Wb,
      c.differentialInductance_H,
      c.apparentInductance_H,
      c.energy_J,
      c.coenergy_J,
    ]) {
      expect(() => use(20.001)).toThrow(expect.objectContaining({ name: 'InvalidQuantity', pointer: '' }));
      expect(() => use(-20.001)).toThrow(expect.objectContaining({ name: 'InvalidQuantity' }));
      expect(relative(use(20 * (1 + 2 ** -52)), use(20))).toBeLessThan(1e-15);
    }
    expect(() => c.current_A(c.fluxLinkage_Wb(20) * 1.001)).toThrow(expect.objectContaining({ pointer: '' }));
  });

  it('holds the inductance constant below a first reading above zero', () => {
    const late = measuredCharacteristic({ kind, current_A: [4, 6, 9], inductance_H: [1e-3, 0.8e-3, 0.6e-3] });
    for (const i of [0, 1e-9, 1, 3.99]) {
      expect(relative(late.differentialInductance_H(i), 1e-3)).toBeLessThan(1e-12);
      expect(relative(late.apparentInductance_H(i), 1e-3)).toBeLessThan(1e-12);
      expect(relative(late.energy_J(i), 5e-4 * i * i)).toBeLessThan(1e-12);
    }
    expect(late.method.validity).toContain('below the first reading at 4 A');
  });

  it('of a constant inductance is linear', () => {
    const flat = measuredCharacteristic({ kind, current_A: [0, 1, 3, 10], inductance_H: [2e-3, 2e-3, 2e-3, 2e-3] });
    for (const i of [0.5, 2, 10]) {
      expect(relative(flat.fluxLinkage_Wb(i), 2e-3 * i)).toBeLessThan(1e-15);
      expect(relative(flat.energy_J(i), 1e-3 * i * i)).toBeLessThan(1e-15);
    }
    expect(flat.method.relativeError).toBeLessThan(1e-14);
  });

  it('keeps dλ/di positive and λ rising for random readings, and monotone between its turns', () => {
    const readings = fc
      .array(fc.tuple(fc.double({ min: 1e-3, max: 10, noNaN: true }), fc.double({ min: 1e-3, max: 1, noNaN: true })), {
        minLength: 2,
        maxLength: 15,
      })
      .map((steps) => {
        let [i, linkage] = [0, 0];
        const all = steps.map(([width, rise]) => {
          i += width;
          linkage += width * rise;
          return { i, value: kind === 'apparent' ? linkage / i : rise };
        });
        return { kind, current_A: all.map((r) => r.i), inductance_H: all.map((r) => r.value) };
      });
    fc.assert(
      fc.property(readings, fc.double({ min: 1e-9, max: 1, noNaN: true }), (random, t) => {
        const any = measuredCharacteristic(random);
        const i = t * any.maximumCurrent_A;
        expect(any.differentialInductance_H(i)).toBeGreaterThan(0);
        expect(relative(any.current_A(any.fluxLinkage_Wb(i)), i)).toBeLessThan(1e-9);
        const turns = any.slopeTurns_A!;
        expect(turns.every((turn, k) => k === 0 || turn > turns[k - 1]!)).toBe(true);
      }),
      { seed: 20_260, numRuns: 300 },
    );
  });
});

describe('apparent sweep', () => {
  it('starts at the inductance read at zero even where it falls fivefold before the next reading', () => {
    const c = measuredCharacteristic({
      kind: 'apparent',
      current_A: [0, 10, 20],
      inductance_H: [1e-3, 0.2e-3, 0.12e-3],
    });
    expect(relative(c.differentialInductance_H(0), 1e-3)).toBeLessThan(1e-14);
    expect(relative(c.fluxLinkage_Wb(10), 2e-3)).toBeLessThan(1e-14);
    for (let i = 0; i <= 20; i += 0.1) expect(c.differentialInductance_H(i)).toBeGreaterThan(0);
  });
});

describe('measuredCharacteristic refuses', () => {
  const of = (current_A: number[], inductance_H: number[], kind: Sweep['kind'] = 'differential'): Sweep => ({
    kind,
    current_A,
    inductance_H,
  });
  const refused: [string, Sweep, string][] = [
    ['one reading', of([1], [1]), '/current_A'],
    ['no readings', of([], []), '/current_A'],
    ['different lengths', of([1, 2, 3], [1, 2]), '/inductance_H'],
    ['falling currents', of([1, 3, 2], [1, 1, 1]), '/current_A/2'],
    ['equal currents', of([1, 1], [1, 1]), '/current_A/1'],
    ['negative currents', of([-1, 1], [1, 1]), '/current_A/0'],
    ['a negative inductance', of([0, 1], [1, -1]), '/inductance_H/1'],
    ['no inductance', of([0, 1], [0, 1]), '/inductance_H/0'],
    ['not a number', of([0, 1], [1, Number.NaN]), '/inductance_H/1'],
    ['a flux linkage that falls', of([0, 1, 2, 3], [1, 1, 0.4, 0.3], 'apparent'), '/inductance_H/2'],
    ['a flux linkage that stands still', of([1, 2], [1, 0.5], 'apparent'), '/inductance_H/1'],
  ];
  it.each(refused)('%s', (_, sweep, pointer) => {
    expect(() => measuredCharacteristic(sweep)).toThrow(expect.objectContaining({ name: 'InvalidQuantity', pointer }));
  });
});
