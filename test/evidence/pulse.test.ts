import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { analysePulse, type Pulse, toSweep } from '../../src/evidence/pulse.ts';
import { coredCharacteristic } from '../../src/physics/characteristics/cored.ts';
import { measuredCharacteristic } from '../../src/physics/characteristics/measured.ts';
import { InvalidQuantity } from '../../src/physics/invalid-quantity.ts';
import { dropCurrent_A } from '../../src/physics/saturation.ts';
import fixture from '../fixtures/scipy/pulse.json' with { type: 'json' };
import { type Law, lawOf, type Recording, recordPulse, type Shape, trueDropCurrent } from './pulse-simulation.ts';

const dropError = (pulse: Pulse, true_A: number) => {
  const found = dropCurrent_A(measuredCharacteristic(toSweep(analysePulse(pulse))), 0.3);
  return found === null ? Number.POSITIVE_INFINITY : Math.abs(found / true_A - 1);
};

const LAWS: readonly (readonly [string, Law])[] = [
  ...(
    [
      ['hyperbolic tangent', 0.02],
      ['hyperbolic tangent', 0.3],
      ['arctangent', 0.02],
      ['froehlich', 0.02],
      ['knee', 0.05],
      ['sharp knee', 0.05],
      ['rising first', 0.05],
    ] as [Shape, number][]
  ).map(([shape, residual]) => [`${shape}, residual ${residual}`, lawOf(shape, residual)] as const),
  [
    'gapped core',
    coredCharacteristic({
      shape: 'cored',
      turns: 40,
      core: {
        effectiveArea_m2: 1e-4,
        effectiveLength_m: 0.1,
        material: { initialPermeability: 2000, saturation: { fluxDensity_T: 0.4 } },
        gap: { length_m: 5e-4 },
      },
    }),
  ],
];

describe('exact pulses solved by scipy', () => {
  it.each(fixture.cases)('$law', (pulse) => {
    const analysis = analysePulse(pulse);
    const characteristic = measuredCharacteristic(toSweep(analysis));
    expect(Math.abs(dropCurrent_A(characteristic, 0.3)! / pulse.dropCurrent_A - 1)).toBeLessThan(2e-4);
    for (const point of pulse.checkpoints) {
      expect(Math.abs(characteristic.fluxLinkage_Wb(point.current_A) / point.fluxLinkage_Wb - 1)).toBeLessThan(1e-4);
      expect(Math.abs(characteristic.energy_J(point.current_A) / point.energy_J - 1)).toBeLessThan(1e-4);
      const inductance_H = characteristic.differentialInductance_H(point.current_A);
      expect(Math.abs(inductance_H / point.differentialInductance_H - 1)).toBeLessThan(1e-3);
    }
  });

  it.each(fixture.cases)('$law: energies within what the switching instant leaves open', (pulse) => {
    const { energy } = analysePulse(pulse);
    expect(Math.abs(energy.dissipated_J / pulse.dissipated_J - 1)).toBeLessThan(0.01);
    // Voltage switches once between two of 300 samples: half an interval of the power there, one part of it each way.
    const open_J = 2 * energy.residualUncertainty_J;
    expect(Math.abs(energy.delivered_J - pulse.delivered_J)).toBeLessThan(open_J);
    expect(Math.abs(energy.recovered_J - pulse.recovered_J)).toBeLessThan(open_J);
    expect(Math.abs(energy.residual_J)).toBeLessThan(open_J);
    expect(open_J).toBeLessThan(0.06 * pulse.delivered_J);
  });
});

describe('the 30 % drop current', () => {
  it.each(LAWS)('$0: within 0.1 % on a clean pulse', (_, law) => {
    const true_A = trueDropCurrent(law);
    for (const [samples, over] of [
      [200, 1.3],
      [1000, 3],
    ] as const) {
      const pulse = recordPulse(law, { samples, peak_A: over * true_A, resistiveShare: 0.3, voltageOffset: 0.01 });
      expect(dropError(pulse, true_A)).toBeLessThan(1e-3);
    }
  });

  it.each(LAWS)('$0: within 3 % at 12 bit and 1 LSB rms of noise', (_, law) => {
    const true_A = trueDropCurrent(law);
    for (const [k, [samples, over]] of [
      [200, 3],
      [500, 1.3],
      [2000, 3],
      [20_000, 2],
    ].entries()) {
      const pulse = recordPulse(law, {
        samples: samples!,
        peak_A: over! * true_A,
        resistiveShare: [0, 0.1, 0.3, 0.3][k]!,
        bits: 12,
        fullScale: samples === 200 ? 'unipolar' : 'bipolar',
        noise: 1,
        seed: k + 1,
        reverse: 1.3,
        voltageOffset: 0.004,
        currentOffset: -0.003,
      });
      expect(dropError(pulse, true_A)).toBeLessThan(samples! < 1000 ? 0.03 : 0.015);
    }
  });

  it('with quantisation and no noise, a swinging voltage, uneven times', () => {
    const law = lawOf('hyperbolic tangent', 0.02);
    const true_A = trueDropCurrent(law);
    const recordings: Partial<Recording>[] = [
      { samples: 400, bits: 12 },
      { samples: 20_000, bits: 12 },
      { samples: 400, bits: 12, noise: 1, drive: 'sine' },
      { samples: 400, bits: 12, noise: 1, jitter: 0.3 },
      { samples: 5000, bits: 10, noise: 1, drive: 'sine' },
    ];
    for (const recording of recordings) {
      const pulse = recordPulse(law, { samples: 400, peak_A: 2 * true_A, ...recording });
      expect(dropError(pulse, true_A)).toBeLessThan(0.03);
    }
  });

  it('of 100,000 samples is known to 0.5 %', () => {
    const law = lawOf('arctangent', 0.02);
    const true_A = trueDropCurrent(law);
    const pulse = recordPulse(law, { samples: 100_000, peak_A: 2 * true_A, bits: 12, noise: 1, voltageOffset: 0.01 });
    expect(dropError(pulse, true_A)).toBeLessThan(0.005);
  });

  it('is not there for an inductance that does not fall', () => {
    const linear: Law = { differentialInductance_H: () => 2e-4, fluxLinkage_Wb: (i) => 2e-4 * i };
    const pulse = recordPulse(linear, { samples: 1000, peak_A: 5, bits: 12, noise: 1, resistiveShare: 0.3 });
    const { sweep } = analysePulse(pulse);
    expect(dropCurrent_A(measuredCharacteristic(toSweep(analysePulse(pulse))), 0.3)).toBeNull();
    for (const inductance_H of sweep.differentialInductance_H) {
      expect(Math.abs(inductance_H / 2e-4 - 1)).toBeLessThan(0.005);
    }
  });
});

describe('uncertainty', () => {
  it('covers the true differential inductance with 2u about 95 times in a hundred', () => {
    let [covered, counted, linkageCovered, pulses] = [0, 0, 0, 0];
    for (const [, law] of LAWS) {
      const true_A = trueDropCurrent(law);
      for (let seed = 1; seed <= 4; seed++) {
        const samples = [250, 1000, 4000][seed % 3]!;
        const recording = { samples, peak_A: 2 * true_A, bits: 12, noise: 1, seed, voltageOffset: 0.004 };
        const { sweep, method } = analysePulse(recordPulse(law, recording));
        sweep.current_A.forEach((current, k) => {
          if (k % 10 !== 0) return;
          const error = Math.abs(sweep.differentialInductance_H[k]! - law.differentialInductance_H(current));
          if (error <= 2 * sweep.standardUncertainty_H[k]!) covered++;
          counted++;
        });
        const linkageError = sweep.fluxLinkage_Wb.at(-1)! / law.fluxLinkage_Wb(sweep.current_A.at(-1)!) - 1;
        if (Math.abs(linkageError) <= method.relativeError) linkageCovered++;
        pulses++;
      }
    }
    expect(covered / counted).toBeGreaterThan(0.93);
    expect(covered / counted).toBeLessThan(0.995);
    expect(linkageCovered / pulses).toBeGreaterThan(0.9);
  });

  it('falls as samples are added and noise is taken away', () => {
    const law = lawOf('hyperbolic tangent', 0.02);
    const typical = (recording: Partial<Recording>) => {
      const { sweep } = analysePulse(
        recordPulse(law, { samples: 1000, peak_A: 2.5, bits: 12, noise: 1, ...recording }),
      );
      return sweep.standardUncertainty_H[100]! / sweep.differentialInductance_H[100]!;
    };
    expect(typical({ samples: 20_000 })).toBeLessThan(0.6 * typical({}));
    expect(typical({ bits: 15 })).toBeLessThan(0.4 * typical({}));
  });
});

describe('offsets', () => {
  const law = lawOf('arctangent', 0.05);
  const peak_A = 2 * trueDropCurrent(law);
  const noisy = { samples: 2000, peak_A, bits: 12, noise: 1, voltageOffset: 0.02, currentOffset: 0.01 };

  it('are taken from the quiet part', () => {
    const pulse = recordPulse(law, noisy);
    const analysis = analysePulse(pulse);
    expect(analysis.voltageOffsetSource).toBe('quiet part');
    // 200 quiet samples of 1.04 LSB noise: a standard error of 0.07 LSB.
    const step_V = (2.4 * Math.max(...pulse.voltage_V.map(Math.abs))) / 4096;
    expect(Math.abs(analysis.voltageOffset_V - pulse.trueVoltageOffset_V)).toBeLessThan(0.3 * step_V);
    expect(Math.abs(analysis.currentOffset_A - 0.01 * peak_A)).toBeLessThan((0.3 * 2.4 * peak_A) / 4096);
  });

  it('are taken from the quiet end of a record that starts with the pulse', () => {
    const analysis = analysePulse(recordPulse(law, { ...noisy, quiet: 0, reverse: 2, on: 0.4 }));
    expect(analysis.voltageOffsetSource).toBe('quiet part');
    expect(Math.abs(analysis.currentOffset_A - 0.01 * peak_A)).toBeLessThan((0.3 * 2.4 * peak_A) / 4096);
  });

  it('are found by closing the loop where nothing is quiet', () => {
    const whole = recordPulse(law, { ...noisy, currentOffset: 0, quiet: 0, reverse: 1.1 });
    const first = 1; // the one before the voltage came is quiet
    const zero = whole.current_A.findIndex((current, k) => k > 1200 && current < 0.004 * peak_A);
    const pulse = {
      ...whole,
      time_s: whole.time_s.slice(first, zero),
      voltage_V: whole.voltage_V.slice(first, zero),
      current_A: whole.current_A.slice(first, zero),
    };
    const analysis = analysePulse(pulse);
    expect(analysis.voltageOffsetSource).toBe('closed loop');
    // The record is cut where the current is still 0.4 % of its peak: that much of the peak's λ, up to 1.5 times as much for the larger
    // inductance at zero current, is open, and the loop takes twice as long as the voltage alone needs: 0.004 · 1.5/2 of the voltage.
    const largest_V = Math.max(...pulse.voltage_V.map(Math.abs));
    expect(Math.abs(analysis.voltageOffset_V - whole.trueVoltageOffset_V)).toBeLessThan(3e-3 * largest_V);
  });

  it('are used as given', () => {
    const pulse = recordPulse(law, noisy);
    const given = analysePulse({ ...pulse, voltageOffset_V: pulse.trueVoltageOffset_V });
    expect(given.voltageOffsetSource).toBe('given');
    expect(given.voltageOffset_V).toBe(pulse.trueVoltageOffset_V);
    const automatic = analysePulse({ ...pulse, voltageOffset_V: 'auto' });
    expect(automatic).toEqual(analysePulse(pulse));
    const wrong = analysePulse({ ...pulse, voltageOffset_V: 0 });
    expect(wrong.sweep.fluxLinkage_Wb.at(-1)!).toBeGreaterThan(1.01 * given.sweep.fluxLinkage_Wb.at(-1)!);
  });
});

describe('hysteresis', () => {
  it('is left in the residual, and the rise is what the sweep shows', () => {
    // The current comes up by f(λ) + h and down by f(λ) − h, h = 4H·λ(P − λ)/P²: the loop holds 4/3·H·P.
    const [samples, on, back_V, peak_Wb, loss_A] = [20_000, 5e-4, 1.25, 5e-4, 0.1];
    const f = (x: number) => 0.5 * x * 1e3 + 2e9 * x ** 3;
    const h = (x: number) => (4 * loss_A * x * (peak_Wb - x)) / peak_Wb ** 2;
    const time_s = Array.from({ length: samples }, (_, k) => (k / samples) * 1.1e-3);
    const start = 1e-4;
    const linkage = time_s.map((t) => {
      if (t < start) return 0;
      return t < start + on ? t - start : Math.max(peak_Wb - back_V * (t - start - on), 0);
    });
    const voltage_V = time_s.map((t, k) => {
      if (t < start || (t > start + on && linkage[k] === 0)) return 0;
      return t < start + on ? 1 : -back_V;
    });
    const current_A = linkage.map((x, k) => f(x) + h(x) * Math.sign(voltage_V[k]!));
    const { energy, sweep } = analysePulse({ time_s, voltage_V, current_A, resistance_ohm: 0 });
    const loop_J = (4 / 3) * loss_A * peak_Wb;
    expect(Math.abs(energy.residual_J - loop_J)).toBeLessThan(2 * energy.residualUncertainty_J);
    expect(energy.residualUncertainty_J).toBeLessThan(0.01 * loop_J);
    sweep.fluxLinkage_Wb.forEach((x, k) => {
      expect(Math.abs(sweep.current_A[k]! - f(x) - h(x))).toBeLessThan(1e-4 * sweep.current_A.at(-1)!);
    });
  });
});

describe('invariance', () => {
  const law = lawOf('knee', 0.1);
  const pulse = recordPulse(law, {
    samples: 300,
    peak_A: 3,
    bits: 12,
    noise: 1,
    voltageOffset: 0.01,
    currentOffset: 0.01,
  });
  const analysis = analysePulse(pulse);

  it('a negative pulse is mirrored', () => {
    const negative = analysePulse({
      ...pulse,
      voltage_V: pulse.voltage_V.map((v) => -v),
      current_A: pulse.current_A.map((i) => -i),
    });
    expect(negative).toEqual({
      ...analysis,
      voltageOffset_V: -analysis.voltageOffset_V,
      currentOffset_A: -analysis.currentOffset_A,
    });
  });

  it('units do not matter', () => {
    // Powers of two, so that not even rounding differs.
    const [t, v, i] = [2 ** -30, 2 ** 30, 2 ** -30];
    const scaled = analysePulse({
      time_s: pulse.time_s.map((x) => x * t),
      voltage_V: pulse.voltage_V.map((x) => x * v),
      current_A: pulse.current_A.map((x) => x * i),
      resistance_ohm: (pulse.resistance_ohm * v) / i,
    });
    expect(scaled.sweep.current_A).toEqual(analysis.sweep.current_A.map((x) => x * i));
    const scale_H = (v * t) / i;
    expect(scaled.sweep.differentialInductance_H).toEqual(
      analysis.sweep.differentialInductance_H.map((x) => x * scale_H),
    );
    expect(scaled.energy.delivered_J).toBe(analysis.energy.delivered_J * v * i * t);
  });

  it('a lone spike of the current does not matter', () => {
    const current_A = pulse.current_A.slice();
    current_A[100]! += 1;
    const spiked = analysePulse({ ...pulse, current_A });
    analysis.sweep.differentialInductance_H.forEach((inductance_H, k) => {
      expect(Math.abs(spiked.sweep.differentialInductance_H[k]! / inductance_H - 1)).toBeLessThan(0.01);
    });
  });

  it('the sweep starts at zero and rises; flux linkage is the integral of the inductance', () => {
    const { current_A, fluxLinkage_Wb } = analysis.sweep;
    expect(current_A[0]).toBe(0);
    expect(fluxLinkage_Wb[0]).toBe(0);
    const characteristic = measuredCharacteristic(toSweep(analysis));
    current_A.slice(1).forEach((current, k) => {
      expect(current).toBeGreaterThan(current_A[k]!);
      expect(Math.abs(characteristic.fluxLinkage_Wb(current) / fluxLinkage_Wb[k + 1]! - 1)).toBeLessThan(1e-3);
    });
    expect(analysis.energy.stored_J / characteristic.energy_J(current_A.at(-1)!)).toBeCloseTo(1, 3);
  });
});

const after = ({ time_s, voltage_V, current_A }: Pulse, first: number) => ({
  time_s: time_s.slice(first),
  voltage_V: voltage_V.slice(first),
  current_A: current_A.slice(first),
});

describe('what cannot be analysed', () => {
  const good = recordPulse(lawOf('froehlich', 0.1), { samples: 100, peak_A: 2 });
  const pointerOf = (pulse: Pulse) => {
    try {
      analysePulse(pulse);
    } catch (error) {
      if (error instanceof InvalidQuantity) return error.pointer;
      throw error;
    }
    return null;
  };
  const zeros = good.time_s.map(() => 0);

  it.each<[string, Partial<Pulse>, string]>([
    ['too few samples', { time_s: [0, 1], voltage_V: [0, 1], current_A: [0, 1] }, '/time_s'],
    ['unequal lengths', { current_A: good.current_A.slice(1) }, '/current_A'],
    ['unequal lengths', { voltage_V: [...good.voltage_V, 0] }, '/voltage_V'],
    ['a time that repeats', { time_s: good.time_s.map((t, k) => (k === 17 ? good.time_s[16]! : t)) }, '/time_s/17'],
    ['a number that is none', { current_A: good.current_A.map((i, k) => (k === 3 ? Number.NaN : i)) }, '/current_A/3'],
    ['a negative resistance', { resistance_ohm: -1 }, '/resistance_ohm'],
    ['a resistance that takes all the voltage', { resistance_ohm: 1e6 }, '/resistance_ohm'],
    ['an infinite offset', { voltageOffset_V: Number.POSITIVE_INFINITY }, '/voltageOffset_V'],
    ['no current', { current_A: zeros }, '/current_A'],
    ['no voltage', { voltage_V: zeros }, '/voltage_V'],
    ['a reversed probe', { voltage_V: good.voltage_V.map((v) => -v) }, '/voltage_V'],
    ['a start at half the current', after(good, 40), '/current_A/0'],
  ])('%s', (_, change, pointer) => {
    expect(pointerOf({ ...good, ...change })).toBe(pointer);
  });

  it('anything whatever is analysed in finite numbers or refused', () => {
    const magnitude = fc.double({ min: -12, max: 12, noNaN: true }).map((x) => 10 ** x);
    const sample = fc.tuple(
      fc.double({ min: 0.1, max: 1 }),
      fc.integer({ min: -9, max: 9 }),
      fc.integer({ min: -3, max: 20 }),
    );
    fc.assert(
      fc.property(
        fc.array(sample, { minLength: 8, maxLength: 40 }),
        fc.tuple(magnitude, magnitude, magnitude),
        fc.boolean(),
        (samples, [t, v, i], orderly) => {
          let now = 0;
          const time_s = samples.map(([step]) => (now += step * t));
          const voltage_V = samples.map(([, level], k) => (orderly ? (k < 5 ? 0 : 9) : level) * v);
          const current_A = samples.map(([, , level], k) => (orderly ? Math.max(k - 5, 0) + level / 50 : level) * i);
          const pulse = { time_s, voltage_V, current_A, resistance_ohm: 0 };
          try {
            const { sweep, energy, method } = analysePulse(pulse);
            const numbers = [...Object.values(sweep).flat(), ...Object.values(energy), method.relativeError];
            expect(numbers.every(Number.isFinite)).toBe(true);
            measuredCharacteristic({
              kind: 'differential',
              current_A: sweep.current_A,
              inductance_H: sweep.differentialInductance_H,
            });
          } catch (error) {
            expect(error).toBeInstanceOf(InvalidQuantity);
          }
        },
      ),
      { numRuns: 60, seed: 4 },
    );
  });
});
