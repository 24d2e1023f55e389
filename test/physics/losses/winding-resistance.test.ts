import { describe, expect, it } from 'vitest';
import { InvalidQuantity } from '../../../src/physics/invalid-quantity.ts';
import {
  type Conductor,
  checkWinding,
  conductorResistance_ohm,
  conductorResistivity_ohm_m,
  conductorTemperatureRange,
  resistanceAtTemperature,
  type Winding,
  windingResistance,
  windowFill,
} from '../../../src/physics/losses/winding-resistance.ts';

const coil: Winding = { turns: 100, meanTurnLength_m: 0.1, wireDiameter_m: 1e-3 };
const strip: Winding = { turns: 10, meanTurnLength_m: 0.1, foilThickness_m: 2e-4, foilWidth_m: 0.02, layers: 10 };

function pointerOf(calculate: () => unknown): string {
  try {
    calculate();
  } catch (error) {
    if (error instanceof InvalidQuantity) return error.pointer;
    throw error;
  }
  return 'accepted';
}

describe('resistivity of conductors', () => {
  it('is 1.7241e-8 Ω·m for annealed copper at 20 °C (IEC 60028:1925)', () => {
    expect(Math.abs(conductorResistivity_ohm_m('copper', 20) - 1.7241e-8)).toBeLessThan(5e-13);
    expect(conductorResistivity_ohm_m('copper', 20) * 58e6).toBeCloseTo(1, 14);
  });

  it('is 28.264e-9 Ω·m for hard-drawn aluminium at 20 °C (IEC 60889:1987)', () => {
    expect(Math.abs(conductorResistivity_ohm_m('aluminium', 20) - 28.264e-9)).toBeLessThan(1e-12);
  });

  it('rises by 0.00393 of its value at 20 °C for a kelvin, from −234.5 °C (IEC 60028, IEC 60034-1)', () => {
    const slope = (conductorResistivity_ohm_m('copper', 120) / conductorResistivity_ohm_m('copper', 20) - 1) / 100;
    expect(Math.abs(slope - 0.00393)).toBeLessThan(5e-6);
    expect(Math.abs(conductorTemperatureRange('copper').lower_degC + 234.5)).toBeLessThan(0.1);
    expect(
      (conductorResistivity_ohm_m('aluminium', 120) / conductorResistivity_ohm_m('aluminium', 20) - 1) / 100,
    ).toBeCloseTo(0.00403, 12);
  });

  it('refuses temperatures at which the conductor has no resistance or is no solid', () => {
    for (const conductor of ['copper', 'aluminium'] satisfies Conductor[]) {
      const { lower_degC, upper_degC } = conductorTemperatureRange(conductor);
      for (const temperature of [-273.15, lower_degC, upper_degC, 1e308, -1e308]) {
        expect(pointerOf(() => conductorResistivity_ohm_m(conductor, temperature))).toBe('/temperature_degC');
      }
      expect(conductorResistivity_ohm_m(conductor, lower_degC + 1e-9)).toBeGreaterThan(0);
      expect(conductorResistivity_ohm_m(conductor, upper_degC - 1e-9)).toBeGreaterThan(0);
    }
  });
});

describe('resistance of wire', () => {
  const circle = (d: number) => (Math.PI / 4) * d * d;

  it('matches enamelled wire of 0.100 mm: nominal 2.176 and minimum 2.034 Ω/m (IEC 60317-0-1)', () => {
    expect(Math.abs(conductorResistance_ohm(1 / 58.5e6, 1, circle(1e-4)) - 2.176)).toBeLessThan(0.001);
    expect(Math.abs(conductorResistance_ohm(1 / 59e6, 1, circle(1.03e-4)) - 2.034)).toBeLessThan(0.0005);
  });

  it('lies within its own relativeError of that nominal wire', () => {
    const { resistance_ohm, method } = windingResistance({ turns: 1, meanTurnLength_m: 1, wireDiameter_m: 1e-4 }, 20);
    expect(Math.abs(resistance_ohm / 2.176 - 1)).toBeLessThan(method.relativeError);
  });

  it('is 0.025 Ω for 5 m of AWG 12 at 1.68e-8 Ω·m (OpenStax, University Physics Vol. 2, ch. 9.3)', () => {
    expect(Math.abs(conductorResistance_ohm(1.68e-8, 5, 3.31e-6) - 0.025)).toBeLessThan(0.0005);
  });
});

describe('windingResistance', () => {
  it('is ρ N l / A, round and foil, strands side by side', () => {
    const rho = 1e-6 / 58;
    const round = (rho * 100 * 0.1) / ((Math.PI / 4) * 1e-6);
    expect(windingResistance(coil, 20).resistance_ohm / round).toBeCloseTo(1, 14);
    expect(windingResistance({ ...coil, strands: 7 }, 20).resistance_ohm / (round / 7)).toBeCloseTo(1, 14);
    expect(windingResistance({ ...coil, conductor: 'aluminium' }, 20).resistance_ohm / (round / 0.61)).toBeCloseTo(
      1,
      14,
    );
    expect(windingResistance(strip, 20).resistance_ohm / ((rho * 10 * 0.1) / (2e-4 * 0.02))).toBeCloseTo(1, 14);
  });

  it('scales: every length by 1e9 and 1e-9 divides the resistance by the same', () => {
    for (const s of [1e9, 1e-9]) {
      const scaled = { ...coil, meanTurnLength_m: 0.1 * s, wireDiameter_m: 1e-3 * s };
      const ratio = windingResistance(scaled, 75).resistance_ohm / windingResistance(coil, 75).resistance_ohm;
      expect(ratio * s).toBeCloseTo(1, 13);
    }
  });

  it('agrees with a resistance carried from one temperature to another, there and back', () => {
    for (const conductor of ['copper', 'aluminium'] satisfies Conductor[]) {
      const at = (t: number) => windingResistance({ ...coil, conductor }, t).resistance_ohm;
      for (const [from, to] of [
        [20, 130],
        [25, -40],
        [-200, 600],
      ] as const) {
        const carried = resistanceAtTemperature(at(from), from, to, conductor);
        expect(carried / at(to)).toBeCloseTo(1, 13);
        expect(resistanceAtTemperature(carried, to, from, conductor) / at(from)).toBeCloseTo(1, 13);
      }
    }
    expect(pointerOf(() => resistanceAtTemperature(1, -235, 20))).toBe('/from_degC');
    expect(pointerOf(() => resistanceAtTemperature(1, 20, 2000))).toBe('/to_degC');
  });

  it('says less of the conductor the further from ordinary temperatures', () => {
    const error = (t: number) => windingResistance(coil, t).method.relativeError;
    expect(error(20)).toBe(0.03);
    expect(error(250)).toBe(0.03);
    expect(error(900)).toBeGreaterThan(error(300));
    expect(error(-200)).toBeGreaterThan(error(-100));
    // Copper at 100 K is 3.5 nΩ·m (Matula, J. Phys. Chem. Ref. Data 8, 1979, from memory); the line gives 4.2.
    const cold = windingResistance(coil, -173.15);
    const atRoom = windingResistance(coil, 20).resistance_ohm;
    expect(Math.abs((cold.resistance_ohm / atRoom) * 17.241 - 3.5) / 3.5).toBeLessThan(cold.method.relativeError);
  });
});

describe('relations between the fields of a winding', () => {
  const { wireDiameter_m: _, ...bare } = coil;

  it.each<[string, Winding, string]>([
    ['no conductor', bare, '/wireDiameter_m'],
    ['wire and foil', { ...coil, foilThickness_m: 1e-4 }, '/wireDiameter_m'],
    ['foil without width', { ...bare, foilThickness_m: 1e-4 }, '/foilWidth_m'],
    ['foil without thickness', { ...bare, foilWidth_m: 1e-2 }, '/foilThickness_m'],
    ['strands of foil', { ...strip, strands: 2 }, '/strands'],
    ['more layers than turns', { ...coil, layers: 101 }, '/layers'],
    ['overlapping turns', { ...coil, pitch_m: 0.99e-3 }, '/pitch_m'],
    ['foil wider than its pitch', { ...strip, pitch_m: 0.019 }, '/pitch_m'],
    ['window under the conductor', { ...coil, windowArea_m2: 7e-5 }, '/windowArea_m2'],
    ['circles denser than they pack', { ...coil, windowArea_m2: 8.6e-5 }, '/windowArea_m2'],
    ['foil over its window', { ...strip, windowArea_m2: 3.9e-5 }, '/windowArea_m2'],
    ['section too small for a number', { ...coil, wireDiameter_m: 1e-200 }, '/wireDiameter_m'],
    ['section too large for a number', { ...coil, wireDiameter_m: 1e200 }, '/wireDiameter_m'],
    ['foil too thin for a number', { ...strip, foilThickness_m: 1e-308, foilWidth_m: 1e-308 }, '/foilThickness_m'],
    [
      'resistance too large for a number',
      { ...coil, meanTurnLength_m: 1e308, wireDiameter_m: 1e-9 },
      '/meanTurnLength_m',
    ],
  ])('%s', (_name, winding, pointer) => {
    expect(pointerOf(() => windingResistance(winding, 20))).toBe(pointer);
  });

  it('takes what can be wound', () => {
    checkWinding({ ...coil, pitch_m: 1e-3, layers: 100, windowArea_m2: 9e-5 });
    checkWinding({ ...strip, pitch_m: 0.02, windowArea_m2: 4e-5 });
    checkWinding({ ...coil, turns: 0.5 });
    checkWinding({ ...coil, wireDiameter_m: 1e-3 });
  });

  it('reports the fill of the window', () => {
    expect(windowFill({ ...coil, windowArea_m2: 1e-4 })).toBeCloseTo(Math.PI / 4, 14);
    expect(windowFill({ ...coil, strands: 2, windowArea_m2: 2e-4 })).toBeCloseTo(Math.PI / 4, 14);
    expect(windowFill({ ...strip, windowArea_m2: 4e-5 })).toBeCloseTo(1, 14);
    expect(windowFill(coil)).toBeUndefined();
  });
});
