import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { FluxCharacteristic } from '../../../src/physics/characteristic.ts';
import { coredCharacteristic } from '../../../src/physics/characteristics/cored.ts';
import { linearCharacteristic } from '../../../src/physics/characteristics/linear.ts';
import { measuredCharacteristic } from '../../../src/physics/characteristics/measured.ts';
import { InvalidQuantity } from '../../../src/physics/invalid-quantity.ts';
import type { Path } from '../../../src/physics/transients/path.ts';
import { type Transient, type TransientRequest, transient } from '../../../src/physics/transients/transient.ts';
import { disguised, saturating } from './saturating.ts';

/** Of the energy audit's largest term. */
const AUDIT = 1e-9;

function audit({ energy }: Transient): number {
  const { initial_J, delivered_J, winding_J, path_J, final_J, residual_J } = energy;
  const largest = Math.max(...[initial_J, delivered_J, winding_J, path_J, final_J].map(Math.abs));
  const left = initial_J + delivered_J - winding_J - path_J - final_J;
  expect(Math.abs(left - residual_J)).toBeLessThanOrEqual(1e-14 * largest);
  return largest === 0 ? 0 : Math.abs(residual_J) / largest;
}

function refusal(inductor: FluxCharacteristic, request: TransientRequest): InvalidQuantity {
  try {
    transient(inductor, request);
  } catch (error) {
    if (error instanceof InvalidQuantity) return error;
    throw error;
  }
  throw new Error('not refused');
}

describe('published RL and RLC values', () => {
  const energise = (inductance_H: number, windingResistance_ohm: number, source_V: number, until_s: number) =>
    transient(linearCharacteristic(inductance_H), { event: 'energise', windingResistance_ohm, source_V, until_s });
  const decay = (inductance_H: number, resistance_ohm: number, initialCurrent_A: number, until_s: number) =>
    transient(linearCharacteristic(inductance_H), {
      event: 'interrupt',
      windingResistance_ohm: 0,
      initialCurrent_A,
      path: { kind: 'resistor', resistance_ohm },
      until_s,
    });
  /** When a decay through a resistor, or its mirror image a rise, has covered all but `left` of its change. */
  const timeTo = (inductance_H: number, resistance_ohm: number, left: number) =>
    transient(linearCharacteristic(inductance_H), {
      event: 'interrupt',
      windingResistance_ohm: resistance_ohm,
      initialCurrent_A: 1,
      path: { kind: 'resistor', resistance_ohm: 0 },
      safeCurrent_A: left,
    }).timeToSafe_s;
  const falling = (inductance_H: number, initialCurrent_A: number, clamp_V: number) =>
    transient(linearCharacteristic(inductance_H), {
      event: 'interrupt',
      windingResistance_ohm: 0,
      initialCurrent_A,
      path: { kind: 'clamp', clamp_V },
    });

  // OpenStax, University Physics Vol. 2 (Ling, Sanny, Moebs), chapter 14; College Physics 2e, chapter 23. Printed digits, half a
  // unit of the last.
  it.each([
    [
      'UP2 example 14.4: 2 V, 4 H, 4 Ω, current after two time constants',
      energise(4, 4, 2, 2).finalCurrent_A,
      0.43,
      5e-3,
    ],
    ['UP2 check 14.3: energy in the steady state of that circuit', energise(4, 4, 2, 100).energy.final_J, 0.5, 5e-3],
    ['UP2 example 14.4: time constant', timeTo(4, 4, Math.exp(-1)), 1.0, 0.05],
    ['UP2 example 14.5: time to half the current, τ = 1 s', timeTo(4, 4, 0.5), 0.69, 5e-3],
    ['UP2 check 14.4: 43 H and 20 Ω rise to 90 %', timeTo(43.4, 20, 0.1), 5.0, 0.05],
    ['UP2 check 14.4: the same with 100 Ω', timeTo(43.4, 100, 0.1), 1.0, 0.05],
    ['UP2 ch. 14: 4 A, 4 mH, 5 Ω after 0.4 ms', decay(4e-3, 5, 4, 0.4e-3).finalCurrent_A, 2.4, 0.05],
    ['UP2 ch. 14: the voltage then', decay(4e-3, 5, 4, 0.4e-3).waveform.voltage_V.at(-1), 12, 0.5],
    ['UP2 ch. 14: half-rise where τ is 2.52 ms', timeTo(2.52e-3, 1, 0.5), 1.75e-3, 5e-6],
    ['UP2 ch. 14: 0.40 V across 0.24 H for 0.30 s', energise(0.24, 0, 0.4, 0.3).finalCurrent_A, 0.5, 5e-3],
    ['UP2 ch. 14: 25 H, 100 A held to 2.50 MV', falling(25, 100, 2.5e6).timeToZero_s, 1.0e-3, 5e-6],
    ['CP2 example 23.9: time constant of 7.50 mH, 3.00 Ω', timeTo(7.5e-3, 3, Math.exp(-1)), 2.5e-3, 5e-6],
    ['CP2 example 23.9: 10 A after 5.00 ms', decay(7.5e-3, 3, 10, 5e-3).finalCurrent_A, 1.35, 5e-3],
    ['CP2 ch. 23: of the final current after 3 τ', energise(1, 1, 1, 3).finalCurrent_A, 0.95, 5e-4],
    ['CP2 ch. 23: 25 H, 100 A held to 31.3 kV', falling(25, 100, 31.3e3).timeToZero_s, 80.0e-3, 2e-4],
    ['CP2 ch. 23: 60 mH, 20 A held to 800 V', falling(60e-3, 20, 800).timeToZero_s, 1.5e-3, 5e-6],
  ])('%s', (_, value, published, tolerance) => {
    expect(Math.abs(value! - published)).toBeLessThanOrEqual(tolerance);
  });

  it('UP2 example 14.6: 20 mH and 8 µF swing at 2.5e3 rad/s, 30 mA against 12 µC', () => {
    const { timeToZero_s, peakVoltage_V } = transient(linearCharacteristic(2e-2), {
      event: 'interrupt',
      windingResistance_ohm: 0,
      initialCurrent_A: 3.0e-2,
      path: { kind: 'snubber', resistance_ohm: 0, capacitance_F: 8e-6 },
    });
    expect(Math.abs(Math.PI / 2 / timeToZero_s! - 2.5e3)).toBeLessThan(50);
    expect(Math.abs(8e-6 * peakVoltage_V - 1.2e-5)).toBeLessThan(5e-7);
  });

  it('UP2 ch. 14: 10 mH and 2 Ω lose half the amplitude in 6.9 ms', () => {
    const { timeToSafe_s } = transient(linearCharacteristic(10e-3), {
      event: 'interrupt',
      windingResistance_ohm: 2,
      initialCurrent_A: 1,
      safeCurrent_A: 0.5,
      path: { kind: 'snubber', resistance_ohm: 0, capacitance_F: 1e-9 },
    });
    expect(Math.abs(timeToSafe_s! - 6.9e-3)).toBeLessThan(5e-5);
  });
});

/** Currents and inductances of a ferrite-like sweep. */
const SWEEP_A = [0, 2, 4, 6, 8, 10, 12, 14, 17, 20, 24, 28];
const SWEEP = {
  kind: 'differential',
  current_A: SWEEP_A,
  inductance_H: SWEEP_A.map((i) => 1e-5 + 1e-3 / Math.cosh(i / 10) ** 2),
} as const;

const GAPPED = coredCharacteristic({
  shape: 'cored',
  turns: 60,
  core: {
    effectiveArea_m2: 1.2e-4,
    effectiveLength_m: 0.1,
    material: { initialPermeability: 2000, saturation: { fluxDensity_T: 0.4 } },
    gap: { length_m: 1e-3 },
  },
});

const arbitraryInductor = fc.oneof(
  fc.double({ min: -9, max: 3, noNaN: true }).map((power) => linearCharacteristic(10 ** power)),
  fc.double({ min: -6, max: 1, noNaN: true }).map((power) => disguised(10 ** power)),
  fc
    .record({ depth: fc.double({ min: -4, max: 0, noNaN: true }), knee: fc.double({ min: -1, max: 2, noNaN: true }) })
    .map(({ depth, knee }) => saturating(1e-3 * 10 ** depth, 1e-3 * 10 ** knee, 10 ** knee)),
  fc.constant(measuredCharacteristic(SWEEP)),
  fc.constant(GAPPED),
);

const resistance = fc.oneof(
  fc.constant(0),
  fc.double({ min: -3, max: 3, noNaN: true }).map((power) => 10 ** power),
);

const arbitraryPath: fc.Arbitrary<Path> = fc.oneof(
  resistance.map((resistance_ohm) => ({ kind: 'resistor', resistance_ohm }) as const),
  fc
    .record({ forwardDrop_V: fc.double({ min: 0.1, max: 3, noNaN: true }), resistance_ohm: resistance })
    .map((fields) => ({ kind: 'diode', ...fields }) as const),
  fc
    .record({ clamp_V: fc.double({ min: 30, max: 1e4, noNaN: true }), resistance_ohm: resistance })
    .map((fields) => ({ kind: 'clamp', ...fields }) as const),
  fc
    .record({ resistance_ohm: resistance, power: fc.double({ min: -9, max: -4, noNaN: true }) })
    .map(({ resistance_ohm, power }) => ({ kind: 'snubber', resistance_ohm, capacitance_F: 10 ** power }) as const),
);

const arbitraryRequest = fc.record({
  inductor: arbitraryInductor,
  windingResistance_ohm: resistance,
  current: fc.double({ min: 0.01, max: 1, noNaN: true }),
  source_V: fc.oneof(
    fc.constant(0),
    fc.double({ min: -2, max: 2, noNaN: true }).map((power) => 10 ** power),
    fc.double({ min: -2, max: 2, noNaN: true }).map((power) => -(10 ** power)),
  ),
  path: arbitraryPath,
});

describe('the energy audit', () => {
  it('closes for any inductor and path, or the request is refused with a field and a reason', () => {
    fc.assert(
      fc.property(arbitraryRequest, ({ inductor, current, path, ...rest }) => {
        const initialCurrent_A = current * Math.min(50, inductor.maximumCurrent_A);
        const safeCurrent_A = initialCurrent_A / 20;
        try {
          const answer = transient(inductor, { event: 'interrupt', initialCurrent_A, safeCurrent_A, path, ...rest });
          expect(audit(answer)).toBeLessThan(AUDIT);
          expect(answer.waveform.current_A.length).toBe(200);
        } catch (error) {
          if (!(error instanceof InvalidQuantity)) throw error;
          expect(error.pointer).toMatch(/^\/(path\/(resistance_ohm|forwardDrop_V|clamp_V)|source_V|until_s)$/);
        }
      }),
      { seed: 20240611, numRuns: 100 },
    );
  });

  it('closes when a source brings the current up', () => {
    fc.assert(
      fc.property(arbitraryRequest, ({ inductor, windingResistance_ohm, source_V, current }) => {
        fc.pre(source_V !== 0);
        // Until about the current wanted at the inductance of zero current, so well into saturation.
        const until_s = (inductor.differentialInductance_H(0) * 20 * current) / Math.abs(source_V);
        try {
          expect(
            audit(transient(inductor, { event: 'energise', windingResistance_ohm, source_V, until_s })),
          ).toBeLessThan(AUDIT);
        } catch (error) {
          if (!(error instanceof InvalidQuantity)) throw error;
          expect(error.pointer).toBe('/until_s');
        }
      }),
      { seed: 20240612, numRuns: 150 },
    );
  });

  it('holds ∫ v dt = Δλ as well', () => {
    for (const inductor of [linearCharacteristic(1e-3), saturating(1e-5, 0.01, 10), GAPPED]) {
      const rising = transient(inductor, {
        event: 'energise',
        windingResistance_ohm: 0.5,
        source_V: 12,
        until_s: 5e-4,
        samples: 8001,
      });
      const gained = inductor.fluxLinkage_Wb(rising.finalCurrent_A);
      expect(Math.abs(simpson(rising.waveform.time_s, rising.waveform.voltage_V) - gained)).toBeLessThan(1e-7 * gained);

      const falling = transient(inductor, {
        event: 'interrupt',
        windingResistance_ohm: 0.5,
        initialCurrent_A: 15,
        source_V: 10,
        path: { kind: 'snubber', resistance_ohm: 10, capacitance_F: 2e-6 },
        until_s: 2e-4,
        samples: 8001,
      });
      const across = falling.waveform.voltage_V.map((v, k) => 10 - v - 0.5 * falling.waveform.current_A[k]!);
      const from = inductor.fluxLinkage_Wb(15);
      const lost = inductor.fluxLinkage_Wb(falling.finalCurrent_A) - from;
      expect(Math.abs(simpson(falling.waveform.time_s, across) - lost)).toBeLessThan(1e-7 * from);
    }
  });
});

function simpson(x: readonly number[], y: readonly number[]): number {
  const step = (x.at(-1)! - x[0]!) / (x.length - 1);
  return (
    y.reduce((sum, value, k) => sum + value * (k === 0 || k === y.length - 1 ? 1 : k % 2 === 1 ? 4 : 2), 0) * (step / 3)
  );
}

describe('the answer', () => {
  const inductor = linearCharacteristic(1e-3);

  it('scales: time with L, voltage with current, over 1e9 and 1e-9', () => {
    const at = (scale: number, currentScale: number, path: Path) =>
      transient(linearCharacteristic(1e-3 * scale), {
        event: 'interrupt',
        windingResistance_ohm: 0.5,
        initialCurrent_A: 10 * currentScale,
        safeCurrent_A: currentScale,
        path,
      });
    const resistor: Path = { kind: 'resistor', resistance_ohm: 3 };
    for (const scale of [1e-9, 1e9]) {
      const [one, long, large] = [at(1, 1, resistor), at(scale, 1, resistor), at(1, scale, resistor)];
      expect(long.timeToSafe_s! / scale / one.timeToSafe_s!).toBeCloseTo(1, 13);
      expect(large.peakVoltage_V / scale / one.peakVoltage_V).toBeCloseTo(1, 13);
      expect(large.energy.path_J / scale ** 2 / one.energy.path_J).toBeCloseTo(1, 13);
      const snubber = (factor: number): Path => ({ kind: 'snubber', resistance_ohm: 3, capacitance_F: 1e-6 * factor });
      const [ring, slowRing] = [at(1, 1, snubber(1)), at(scale, 1, snubber(scale))];
      expect(slowRing.timeToSafe_s! / scale / ring.timeToSafe_s!).toBeCloseTo(1, 12);
      expect(slowRing.peakVoltage_V / ring.peakVoltage_V).toBeCloseTo(1, 12);
    }
  });

  it('ends where a one-way path has taken the current to zero, with what the source holds across it', () => {
    const request = {
      event: 'interrupt',
      windingResistance_ohm: 0.1,
      initialCurrent_A: 10,
      source_V: 24,
      path: { kind: 'clamp', clamp_V: 60 },
    } as const;
    const answer = transient(inductor, request);
    expect(answer.finalCurrent_A).toBe(0);
    expect(answer.waveform.time_s.at(-1)).toBe(answer.timeToZero_s);
    expect(answer.peakVoltage_V).toBe(60);
    expect(answer.waveform.voltage_V[0]).toBe(60);
    expect(answer.waveform.voltage_V.at(-1)).toBe(24);
    // Looked at for longer it is the same.
    const longer = transient(inductor, { ...request, until_s: 10 });
    expect(longer.timeToZero_s).toBe(answer.timeToZero_s);
    expect(longer.energy).toEqual(answer.energy);
    expect(longer.waveform.current_A.slice(1).every((i) => i === 0)).toBe(true);
  });

  it('has no time for what does not happen, or not by the end', () => {
    const decaying = { event: 'interrupt', windingResistance_ohm: 1, initialCurrent_A: 10 } as const;
    const resistor: Path = { kind: 'resistor', resistance_ohm: 1 };
    expect(transient(inductor, { ...decaying, path: resistor }).timeToZero_s).toBeNull();
    expect(transient(inductor, { ...decaying, path: resistor }).timeToSafe_s).toBeNull();
    expect(transient(inductor, { ...decaying, path: resistor, safeCurrent_A: 0 }).timeToSafe_s).toBeNull();
    expect(
      transient(inductor, { ...decaying, path: resistor, safeCurrent_A: 1, until_s: 1e-4 }).timeToSafe_s,
    ).toBeNull();
    expect(transient(inductor, { ...decaying, path: resistor, safeCurrent_A: 20 }).timeToSafe_s).toBe(0);
    // With the source it settles at 24 V/2 Ω = 12 A.
    const settling = transient(inductor, { ...decaying, path: resistor, source_V: 24, safeCurrent_A: 11 });
    expect(settling.timeToSafe_s).toBeNull();
    expect(settling.timeToZero_s).toBeNull();
    expect(Math.abs(settling.finalCurrent_A - 12)).toBeLessThan(0.0021);
    // At rest already: source and resistances balance.
    const resting = transient(inductor, { ...decaying, path: resistor, source_V: 20 });
    expect(resting.waveform.current_A.every((i) => i === 10)).toBe(true);
    expect(audit(resting)).toBeLessThan(AUDIT);
    // Through a diode zero is reached, so that zero can be the safe current.
    const diode = transient(inductor, { ...decaying, path: { kind: 'diode', forwardDrop_V: 0.7 }, safeCurrent_A: 0 });
    expect(diode.timeToSafe_s).toBe(diode.timeToZero_s);
    // A default end waits for the safe current, however small.
    const patient = transient(inductor, { ...decaying, path: resistor, safeCurrent_A: 1e-30 });
    expect(patient.timeToSafe_s!).toBeCloseTo((1e-3 / 2) * Math.log(1e31), 12);
  });

  it('carries the characteristic’s model error and references', () => {
    const method = { name: 'a', references: ['b'], relativeError: 0.03, validity: 'c' };
    const answer = transient(linearCharacteristic(1, method), {
      event: 'energise',
      windingResistance_ohm: 1,
      source_V: 1,
    });
    expect(answer.method.relativeError).toBe(0.03);
    expect(answer.method.references).toContain('b');
    expect(answer.method.name).toContain('closed form');
  });
});

describe('what cannot be', () => {
  const inductor = linearCharacteristic(1e-3);
  const interrupt = { event: 'interrupt', windingResistance_ohm: 0, initialCurrent_A: 10 } as const;

  it.each<[string, TransientRequest, string, RegExp]>([
    ['no path', interrupt, '/path', /no bound/],
    [
      'a clamp below the source',
      { ...interrupt, source_V: 48, path: { kind: 'clamp', clamp_V: 40 } },
      '/path/clamp_V',
      /does not exceed the source/,
    ],
    [
      'a clamp at the source',
      { ...interrupt, source_V: 48, path: { kind: 'clamp', clamp_V: 48, resistance_ohm: 3 } },
      '/path/clamp_V',
      /does not exceed the source/,
    ],
    [
      'a diode with a source',
      { ...interrupt, source_V: 48, path: { kind: 'diode', forwardDrop_V: 0.7 } },
      '/path/forwardDrop_V',
      /does not exceed the source/,
    ],
    [
      'nothing that takes energy',
      { ...interrupt, path: { kind: 'diode', forwardDrop_V: 0 } },
      '/path/forwardDrop_V',
      /never decays/,
    ],
    [
      'a short',
      { ...interrupt, path: { kind: 'resistor', resistance_ohm: 0 } },
      '/path/resistance_ohm',
      /never decays/,
    ],
    [
      'a source and no resistance, without an end',
      { ...interrupt, source_V: 1, path: { kind: 'resistor', resistance_ohm: 0 } },
      '/until_s',
      /without limit/,
    ],
    [
      'the same when energising',
      { event: 'energise', windingResistance_ohm: 0, source_V: 1 },
      '/until_s',
      /without limit/,
    ],
    ['no source', { event: 'energise', windingResistance_ohm: 1, source_V: 0 }, '/source_V', /no source/],
    ['no current', { ...interrupt, initialCurrent_A: 0 }, '/initialCurrent_A', /positive/],
    [
      'no time',
      { event: 'energise', windingResistance_ohm: 1, source_V: 1, until_s: 0 },
      '/until_s',
      /after the start/,
    ],
    ['no waveform', { event: 'energise', windingResistance_ohm: 1, source_V: 1, samples: 1 }, '/samples', /2 or more/],
  ])('%s', (_, request, pointer, reason) => {
    for (const each of [inductor, disguised(1e-3)]) {
      const { pointer: at, detail } = refusal(each, request);
      expect(at).toBe(pointer);
      expect(detail).toMatch(reason);
    }
  });

  it('a current beyond the last reading of a sweep', () => {
    const measured = measuredCharacteristic(SWEEP);
    const energise = { event: 'energise', windingResistance_ohm: 0.1, source_V: 12 } as const;
    expect(refusal(measured, energise).pointer).toBe('/source_V');
    expect(refusal(measured, energise).detail).toMatch(/heads for 120 A.*ends at 28 A.*not extrapolated/);
    expect(refusal(measured, { ...energise, until_s: 1 }).pointer).toBe('/until_s');
    expect(refusal(measured, { ...energise, windingResistance_ohm: 0, until_s: 1 }).pointer).toBe('/until_s');
    expect(transient(measured, { ...energise, until_s: 1e-4 }).finalCurrent_A).toBeLessThan(28);
    // Just under, it reaches its end.
    const full = transient(measured, { ...energise, windingResistance_ohm: 0.43 });
    expect(full.finalCurrent_A).toBeCloseTo((0.999 * 12) / 0.43, 10);
    expect(refusal(measured, { ...interruptAt(28.1), path: { kind: 'clamp', clamp_V: 50 } }).pointer).toBe(
      '/initialCurrent_A',
    );
    const snubber: Path = { kind: 'snubber', resistance_ohm: 0.1, capacitance_F: 1e-4 };
    expect(refusal(measured, { ...interruptAt(28), source_V: 100, path: snubber }).pointer).toBe('/source_V');
    expect(refusal(measured, { ...interruptAt(28), source_V: 100, path: snubber, until_s: 1e-3 }).pointer).toBe(
      '/until_s',
    );
    expect(audit(transient(measured, { ...interruptAt(28), path: snubber }))).toBeLessThan(AUDIT);
  });

  it('more oscillations than are followed', () => {
    const undamped: Path = { kind: 'snubber', resistance_ohm: 0, capacitance_F: 1e-6 };
    const { pointer, detail } = refusal(GAPPED, { ...interruptAt(5), path: undamped, until_s: 1e3 });
    expect(pointer).toBe('/until_s');
    expect(detail).toMatch(/oscillations/);
  });

  it('never gives NaN or Infinity, at the ends of the range', () => {
    const extremes = [1e-308, 1e-150, 1, 1e308];
    const paths = (value: number): Path[] => [
      { kind: 'resistor', resistance_ohm: value },
      { kind: 'diode', forwardDrop_V: value },
      { kind: 'clamp', clamp_V: value },
      { kind: 'snubber', resistance_ohm: value, capacitance_F: 1e-6 },
      { kind: 'snubber', resistance_ohm: 1, capacitance_F: value },
    ];
    let answered = 0;
    for (const inductance_H of [1e-308, 1e-12, 1e308]) {
      for (const value of extremes) {
        for (const path of paths(value)) {
          for (const initialCurrent_A of extremes) {
            for (const characteristic of [linearCharacteristic(inductance_H), disguised(inductance_H)]) {
              try {
                const answer = transient(characteristic, {
                  event: 'interrupt',
                  windingResistance_ohm: 1e-3,
                  initialCurrent_A,
                  safeCurrent_A: initialCurrent_A / 2,
                  samples: 3,
                  path,
                });
                const { waveform, energy } = answer;
                const numbers = [
                  answer.peakVoltage_V,
                  answer.finalCurrent_A,
                  answer.timeToSafe_s ?? 0,
                  ...Object.values(energy),
                  ...waveform.time_s,
                  ...waveform.current_A,
                  ...waveform.voltage_V,
                ];
                expect(numbers.every(Number.isFinite)).toBe(true);
                answered++;
              } catch (error) {
                expect(error).toBeInstanceOf(InvalidQuantity);
              }
            }
          }
        }
      }
    }
    expect(answered).toBeGreaterThan(100);
  });
});

function interruptAt(initialCurrent_A: number) {
  return { event: 'interrupt', windingResistance_ohm: 0.1, initialCurrent_A } as const;
}
