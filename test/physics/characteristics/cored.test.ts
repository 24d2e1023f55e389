import { describe, expect, it } from 'vitest';
import { differentialInductanceError, methodAt } from '../../../src/physics/characteristic.ts';
import { type Cored, coredCharacteristic } from '../../../src/physics/characteristics/cored.ts';
import type { Gap } from '../../../src/physics/core/gap.ts';
import type { Magnetisation, Material } from '../../../src/physics/core/material.ts';
import { integrate } from '../../../src/physics/numerics/quadrature.ts';
import { fluxLimitCurrent_A } from '../../../src/physics/saturation.ts';
import fixture from '../../fixtures/mpmath/cored.json' with { type: 'json' };

const MU0 = 1.25663706127e-6;
const relative = (value: number, truth: number) => (truth === 0 ? Math.abs(value) : Math.abs(value / truth - 1));

type Law = Extract<Magnetisation, string>;
const LAWS: readonly Law[] = ['hyperbolic-tangent', 'arctangent', 'froehlich'];

/** A rising and falling permeability, as of steel: H in A/m, B in T. */
const STEEL = {
  field_A_per_m: [20, 50, 100, 200, 500, 1000, 2000, 5000, 1e4, 3e4],
  fluxDensity_T: [0.01, 0.05, 0.2, 0.6, 1.1, 1.3, 1.45, 1.6, 1.72, 1.95],
};

const coil = (material: Material, gap?: Gap, turns = 40): Cored => ({
  shape: 'cored',
  turns,
  core: { effectiveArea_m2: 178e-6, effectiveLength_m: 0.097, material, ...(gap ? { gap } : {}) },
});
const ferrite = (magnetisation: Magnetisation): Material => ({
  initialPermeability: 2300,
  saturation: { fluxDensity_T: 0.39 },
  magnetisation,
});
const COILS: [string, Cored][] = [
  ...LAWS.flatMap((law): [string, Cored][] => [
    [`${law}, no gap`, coil(ferrite(law))],
    [`${law}, gapped`, coil(ferrite(law), { length_m: 1e-3, legDiameter_m: 0.0151 })],
    [`${law}, µ 1e6`, coil({ ...ferrite(law), initialPermeability: 1e6 }, { length_m: 1e-4 })],
  ]),
  ['table, no gap', coil({ initialPermeability: 400, saturation: { fluxDensity_T: 1.8 }, magnetisation: STEEL })],
  ['table, gapped', coil({ initialPermeability: 400, magnetisation: STEEL }, { length_m: 5e-4, area_m2: 2e-4 })],
  ['linear', coil({ initialPermeability: 60 }, { length_m: 1e-3 })],
  ['vacuum', coil({ initialPermeability: 1, saturation: { fluxDensity_T: 0.4 } })],
];
const CURRENTS = [1e-12, 1e-3, 0.1, 0.5, 1, 2, 5, 10, 30, 100, 1e4, 1e8];

describe('coredCharacteristic against published values', () => {
  // Fitzgerald, Kingsley, Umans, Electric Machinery, 6th ed., Example 1.1: Ac = Ag = 9 cm², g = 0.05 cm, lc = 30 cm, N = 500, µr = 70 000.
  const example = coredCharacteristic({
    shape: 'cored',
    turns: 500,
    core: {
      effectiveArea_m2: 9e-4,
      effectiveLength_m: 0.3,
      material: { initialPermeability: 70_000 },
      gap: { length_m: 5e-4 },
    },
  });

  it('needs 0.80 A for 1.0 T', () => {
    expect(Math.abs(example.currentAtFluxDensity_A(1) - 0.8)).toBeLessThan(0.005);
    expect(relative(example.currentAtFluxDensity_A(1), 0.8025956)).toBeLessThan(1e-7);
  });

  it('has the core and gap reluctances 3.79e3 and 4.42e5 A/Wb', () => {
    const { core_J, gap_J } = example.storedEnergy(1);
    const flux_Wb = example.fluxLinkage_Wb(1) / 500;
    expect(Math.abs((2 * core_J) / flux_Wb ** 2 - 3.79e3)).toBeLessThan(5);
    expect(Math.abs((2 * gap_J) / flux_Wb ** 2 - 4.42e5)).toBeLessThan(5e2);
  });

  it('carries 0.0048 Wb in a core of two sections', () => {
    // Chapman, Electric Machinery Fundamentals, Example 1-1: 200 A·turns, µr = 2500, 1.30 m on 150 cm² and 0.45 m on 100 cm².
    // In series: C1 = Σ l/A, C2 = Σ l/A² give one uniform core of the same reluctance.
    const c1 = 1.3 / 0.015 + 0.45 / 0.01;
    const c2 = 1.3 / 0.015 ** 2 + 0.45 / 0.01 ** 2;
    const chapman = coredCharacteristic({
      shape: 'cored',
      turns: 200,
      core: {
        effectiveArea_m2: c1 / c2,
        effectiveLength_m: c1 ** 2 / c2,
        minimumArea_m2: 0.01,
        material: { initialPermeability: 2500 },
      },
    });
    const flux_Wb = chapman.fluxLinkage_Wb(1) / 200;
    expect(Math.abs(flux_Wb - 0.0048)).toBeLessThan(5e-5);
    expect(relative(flux_Wb, 0.004772039)).toBeLessThan(1e-6);
    expect(relative(chapman.fluxDensity_T(1), flux_Wb / 0.01)).toBeLessThan(1e-15);
  });
});

describe('coredCharacteristic against roots found in 130 digits', () => {
  type Numbers = [number, number, number, number, number, number, number, number, number, number, number, number];
  const cases = fixture.rows.map((row) => {
    const [law, ...numbers] = row as [Law, ...Numbers];
    const [
      initialPermeability,
      saturation_T,
      gap_m,
      area_m2,
      i,
      linkage,
      slope,
      core,
      gap,
      coenergy,
      condition,
      limit,
    ] = numbers;
    const characteristic = coredCharacteristic({
      shape: 'cored',
      turns: fixture.turns,
      core: {
        effectiveArea_m2: fixture.effectiveArea_m2,
        effectiveLength_m: fixture.effectiveLength_m,
        material: { initialPermeability, saturation: { fluxDensity_T: saturation_T }, magnetisation: law },
        ...(gap_m > 0 ? { gap: { length_m: gap_m, area_m2 } } : {}),
      },
    });
    return { characteristic, saturation_T, i, linkage, slope, core, gap, coenergy, condition, limit };
  });
  const worst = (error: (row: (typeof cases)[number]) => number) => Math.max(...cases.map(error));

  it('covers 720 cases, 1e-30 A to a million times the flux limit', () => {
    expect(cases.length).toBe(720);
  });

  it('λ and apparent inductance to 1e-14', () => {
    expect(worst(({ characteristic: c, i, linkage }) => relative(c.fluxLinkage_Wb(i), linkage))).toBeLessThan(1e-14);
    expect(worst(({ characteristic: c, i, linkage }) => relative(c.apparentInductance_H(i), linkage / i))).toBeLessThan(
      1e-14,
    );
  });

  it('energy of core and of gap to 5e-14, their sum and the co-energy to 1e-14', () => {
    expect(worst(({ characteristic: c, i, core }) => relative(c.storedEnergy(i).core_J, core))).toBeLessThan(5e-14);
    expect(worst(({ characteristic: c, i, gap }) => relative(c.storedEnergy(i).gap_J, gap))).toBeLessThan(1e-14);
    expect(worst(({ characteristic: c, i, core, gap }) => relative(c.energy_J(i), core + gap))).toBeLessThan(1e-14);
    expect(worst(({ characteristic: c, i, coenergy }) => relative(c.coenergy_J(i), coenergy))).toBeLessThan(1e-14);
  });

  it('differential inductance to 1e-14 of its condition, so to 1e-10 everywhere', () => {
    const error = ({ characteristic: c, i, slope }: (typeof cases)[number]) =>
      relative(c.differentialInductance_H(i), slope);
    expect(worst((row) => error(row) / (1 + row.condition))).toBeLessThan(1e-14);
    expect(worst(error)).toBeLessThan(1e-10);
  });

  it('flux limit to 1e-12', () => {
    expect(
      worst(({ characteristic: c, saturation_T, limit }) => relative(c.currentAtFluxDensity_A(saturation_T), limit)),
    ).toBeLessThan(1e-12);
  });
});

describe.each(COILS)('properties: %s', (_, part) => {
  const c = coredCharacteristic(part);

  it('energy + co-energy = i·λ, and the split sums to the whole', () => {
    for (const i of CURRENTS) {
      expect(relative(c.energy_J(i) + c.coenergy_J(i), i * c.fluxLinkage_Wb(i))).toBeLessThan(1e-14);
      const { total_J, core_J, gap_J } = c.storedEnergy(i);
      expect(total_J).toBe(core_J + gap_J);
      expect(core_J).toBeGreaterThan(0);
      expect(gap_J > 0).toBe(part.core.gap !== undefined);
    }
  });

  it('λ rises, is odd, and dλ/di is its slope', () => {
    let before = 0;
    for (const i of CURRENTS) {
      const linkage = c.fluxLinkage_Wb(i);
      expect(linkage).toBeGreaterThan(before);
      before = linkage;
      expect(c.fluxLinkage_Wb(-i)).toBe(-linkage);
      expect(c.energy_J(-i)).toBe(c.energy_J(i));
      expect(c.differentialInductance_H(-i)).toBe(c.differentialInductance_H(i));
      const step = i * 1e-5;
      const difference = (c.fluxLinkage_Wb(i + step) - c.fluxLinkage_Wb(i - step)) / (2 * step);
      const tolerance = 1e-6 * Math.max(1, c.apparentInductance_H(i) / c.differentialInductance_H(i));
      expect(relative(difference, c.differentialInductance_H(i))).toBeLessThan(Math.max(tolerance, 1e-6));
    }
  });

  it('is ½LI² near zero current, without dividing by zero at it', () => {
    const inductance = c.differentialInductance_H(0);
    expect(c.apparentInductance_H(0)).toBe(inductance);
    expect(c.fluxLinkage_Wb(0)).toBe(0);
    expect(c.energy_J(0)).toBe(0);
    const i = 1e-14;
    expect(relative(c.energy_J(i), (inductance * i * i) / 2)).toBeLessThan(1e-9);
    expect(relative(c.fluxLinkage_Wb(1e-200), inductance * 1e-200)).toBeLessThan(1e-14);
  });

  it('the inverse gives the current back, as well as λ determines it', () => {
    for (const i of CURRENTS) {
      const condition = c.apparentInductance_H(i) / c.differentialInductance_H(i);
      expect(relative(c.current_A(c.fluxLinkage_Wb(i)), i)).toBeLessThan(2e-15 * (1 + condition));
      expect(c.current_A(-c.fluxLinkage_Wb(i))).toBe(-c.current_A(c.fluxLinkage_Wb(i)));
    }
    expect(c.current_A(0)).toBe(0);
  });

  it('energy is ∫ i dλ and co-energy ∫ λ di by Gauss-Legendre quadrature', () => {
    const top = 12;
    // Panels end where a table's pieces do, and crowd about the knee, which with µ 1e6 is a few thousandths of its current wide.
    const knee = c.currentAtFluxDensity_A(0.39);
    const crowd = Array.from({ length: 160 }, (_unused, n) => 2 ** (-n / 8));
    const edges = [
      top,
      ...(c.slopeTurns_A ?? []),
      ...crowd.flatMap((x) => [knee * (1 - x), knee * (1 + x)]),
      2 * knee,
      5 * knee,
    ]
      .filter((i) => i > 0 && i <= top)
      .sort((a, b) => a - b);
    let [energy, coenergy, from] = [0, 0, 0];
    for (const to of edges) {
      coenergy += integrate((i) => c.fluxLinkage_Wb(i), from, to, 12);
      energy += integrate((i) => i * c.differentialInductance_H(i), from, to, 12);
      from = to;
    }
    expect(relative(c.coenergy_J(top), coenergy)).toBeLessThan(1e-9);
    expect(relative(c.energy_J(top), energy)).toBeLessThan(1e-9);
  });
});

describe('coredCharacteristic', () => {
  it('stores the energy of ½·L·I² where the material is linear, core and gap in the ratio of their reluctances', () => {
    const c = coredCharacteristic(coil({ initialPermeability: 100 }, { length_m: 1e-3 }));
    const inductance = (40 ** 2 * MU0 * 178e-6) / (0.097 / 100 + 1e-3);
    for (const i of [1e-6, 1, 1e6]) {
      expect(relative(c.energy_J(i), (inductance * i * i) / 2)).toBeLessThan(1e-14);
      const { core_J, gap_J } = c.storedEnergy(i);
      expect(relative(gap_J / core_J, 1e-3 / (0.097 / 100))).toBeLessThan(1e-14);
    }
  });

  it('passes through the points of a table: N·i = H·l_c + B·l_g·(A_e/A_g)/µ0 there', () => {
    const c = coredCharacteristic(
      coil({ initialPermeability: 400, magnetisation: STEEL }, { length_m: 5e-4, area_m2: 2e-4 }),
    );
    STEEL.field_A_per_m.forEach((field, k) => {
      const fluxDensity = STEEL.fluxDensity_T[k]!;
      const i = (field * 0.097 + ((fluxDensity * 5e-4) / MU0) * (178e-6 / 2e-4)) / 40;
      expect(relative(c.fluxLinkage_Wb(i), 40 * fluxDensity * 178e-6)).toBeLessThan(1e-13);
    });
    expect(c.method.validity).toContain("the table's own initial slope governs");
    expect(c.method.validity).toContain('fully saturated');
  });

  it('puts the flux of the effective area into the smallest section', () => {
    const part = coil(ferrite('hyperbolic-tangent'), { length_m: 1e-3 });
    const narrow = { ...part, core: { ...part.core, minimumArea_m2: 150e-6 } };
    const c = coredCharacteristic(narrow);
    expect(relative(c.fluxDensity_T(5) * 150e-6 * 40, c.fluxLinkage_Wb(5))).toBeLessThan(1e-15);
    expect(relative(c.fluxDensity_T(c.currentAtFluxDensity_A(0.39)), 0.39)).toBeLessThan(1e-14);
    expect(fluxLimitCurrent_A(narrow)!).toBeLessThan(fluxLimitCurrent_A(part)!);
  });

  it('saturates at the flux density of the temperature', () => {
    const list = [
      { temperature_degC: 25, fluxDensity_T: 0.49 },
      { temperature_degC: 100, fluxDensity_T: 0.39 },
    ];
    const part = coil({ initialPermeability: 2300, saturation: list }, { length_m: 1e-3 });
    const fixed = (fluxDensity_T: number) =>
      coredCharacteristic(coil({ initialPermeability: 2300, saturation: { fluxDensity_T } }, { length_m: 1e-3 }));
    expect(coredCharacteristic(part, 100).fluxLinkage_Wb(20)).toBe(fixed(0.39).fluxLinkage_Wb(20));
    expect(relative(coredCharacteristic(part, 62.5).fluxLinkage_Wb(20), fixed(0.44).fluxLinkage_Wb(20))).toBeLessThan(
      1e-14,
    );
    expect(coredCharacteristic(part).fluxLinkage_Wb(20)).toBe(fixed(0.49).fluxLinkage_Wb(20));
    expect(() => coredCharacteristic(part, 101)).toThrow(
      expect.objectContaining({ pointer: '/core/material/saturation' }),
    );
  });

  it('scales: a billion times every length, with the current, leaves flux density and multiplies inductance', () => {
    const part = coil(ferrite('froehlich'), { length_m: 1e-3, legWidth_m: 0.012, legDepth_m: 0.015 });
    for (const s of [1e9, 1e-9]) {
      const scaled = coredCharacteristic({
        ...part,
        core: {
          ...part.core,
          effectiveArea_m2: part.core.effectiveArea_m2! * s * s,
          effectiveLength_m: part.core.effectiveLength_m! * s,
          gap: { length_m: 1e-3 * s, legWidth_m: 0.012 * s, legDepth_m: 0.015 * s },
        },
      });
      const c = coredCharacteristic(part);
      for (const i of [1, 8, 40]) {
        expect(relative(scaled.fluxDensity_T(i * s), c.fluxDensity_T(i))).toBeLessThan(1e-13);
        expect(relative(scaled.differentialInductance_H(i * s), s * c.differentialInductance_H(i))).toBeLessThan(1e-12);
      }
    }
  });

  it('takes dimensions in place of effective parameters', () => {
    const ring = coredCharacteristic({
      shape: 'cored',
      turns: 10,
      core: {
        dimensions: { kind: 'ring', outerDiameter_m: 0.025, innerDiameter_m: 0.015, height_m: 0.01 },
        material: { initialPermeability: 5000 },
      },
    });
    // A toroid of rectangular section has L = µ N² h ln(r2/r1)/(2π) exactly.
    const exact = (5000 * MU0 * 100 * 0.01 * Math.log(25 / 15)) / (2 * Math.PI);
    expect(relative(ring.differentialInductance_H(0), exact)).toBeLessThan(1e-15);
  });

  it('is less sure of itself with a longer gap, deeper in saturation, and of dλ/di beyond the knee', () => {
    const error = (gap_m: number, i: number) => {
      const part = coil(ferrite('hyperbolic-tangent'), { length_m: gap_m, legDiameter_m: 0.0151 });
      return methodAt(coredCharacteristic(part), i).relativeError;
    };
    expect(error(1e-3, 0)).toBeGreaterThan(error(1e-4, 0));
    expect(error(1e-4, 40)).toBeGreaterThan(error(1e-4, 0));
    const c = coredCharacteristic(coil(ferrite('hyperbolic-tangent')));
    expect(c.method.relativeError).toBeLessThan(0.02);
    expect(c.relativeErrorAt!(0)).toBe(c.method.relativeError);
    const knee = fluxLimitCurrent_A(coil(ferrite('hyperbolic-tangent')))! / 2;
    expect(differentialInductanceError(c, knee)).toBeGreaterThan(c.relativeErrorAt!(knee));
    expect(differentialInductanceError(c, 0)).toBeCloseTo(c.method.relativeError, 10);
    expect(c.relativeErrorAt!(1e9)).toBeLessThanOrEqual(1);
  });

  it('names what it assumed', () => {
    expect(coredCharacteristic(coil({ initialPermeability: 60 })).method.validity).toContain('no saturation is given');
    const gapped = coredCharacteristic(coil(ferrite('arctangent'), { length_m: 1e-3, legDiameter_m: 0.0151 }));
    expect(gapped.method.name).toContain('arctangent');
    expect(gapped.method.validity).toContain('expanded-area');
  });

  const refused: [string, Cored, string][] = [
    ['no turns', coil(ferrite('froehlich'), undefined, 0), '/turns'],
    ['a gap longer than the path', coil(ferrite('froehlich'), { length_m: 0.1 }), '/core/gap/length_m'],
    ['a permeability under one', coil({ initialPermeability: 0.5 }), '/core/material/initialPermeability'],
    [
      'no area',
      { shape: 'cored', turns: 1, core: { effectiveLength_m: 0.1, material: { initialPermeability: 1 } } },
      '/core/effectiveArea_m2',
    ],
    [
      'a table of different lengths',
      coil({ initialPermeability: 1, magnetisation: { field_A_per_m: [1, 2], fluxDensity_T: [1] } }),
      '/core/material/magnetisation/fluxDensity_T',
    ],
  ];
  it.each(refused)('refuses %s', (_, part, pointer) => {
    expect(() => coredCharacteristic(part)).toThrow(expect.objectContaining({ name: 'InvalidQuantity', pointer }));
  });

  it('ends with a number or an InvalidQuantity at the edge of 64-bit numbers', () => {
    for (const turns of [1e-300, 1, 1e300]) {
      for (const i of [1e-308, 1, 1e308]) {
        const c = coredCharacteristic(coil(ferrite('hyperbolic-tangent'), { length_m: 1e-3 }, turns));
        let linkage: number;
        try {
          linkage = c.fluxLinkage_Wb(i);
        } catch (error) {
          expect(error).toMatchObject({ name: 'InvalidQuantity' });
          continue;
        }
        expect(linkage).not.toBeNaN();
      }
    }
  });
});
