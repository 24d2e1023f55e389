import { describe, expect, it } from 'vitest';
import { cautionsOf } from '../../src/approval/cautions.ts';
import { evaluate } from '../../src/approval/evaluate.ts';
import type { ApprovalRequest } from '../../src/approval/request.ts';

const codesOf = (cautions: readonly { code: string }[]) => cautions.map(({ code }) => code);
const part = { number: 'LG-1', revision: 'A' };

describe('cautions', () => {
  it.each([
    // IEC 60950-1, 2.1.1.5: 20 J
    [{ storedEnergy_J: 19.99 }, ['stored-energy']],
    [{ storedEnergy_J: 20 }, ['stored-energy', 'hazardous-energy']],
    // IEC 61140: 60 V DC
    [{ turnOffVoltage_V: 60 }, []],
    [{ turnOffVoltage_V: 60.1 }, ['turn-off-voltage']],
    // ICNIRP 2009: 0.5 mT
    [{ fluxDensity_T: 0.5e-3 }, []],
    [{ fluxDensity_T: 0.51e-3 }, ['static-field']],
    // ISO 13732-1: 65 °C
    [{ surface_degC: 65 }, []],
    [{ surface_degC: 66 }, ['hot-surface']],
  ])('of %j are %j', (hazards, codes) => {
    const cautions = cautionsOf(hazards);
    expect(codesOf(cautions)).toEqual(codes);
    for (const { text } of cautions) expect(text).toMatch(/local codes.*licensed practitioner/);
  });
});

describe('cautions of an approval', () => {
  const sweep = { kind: 'differential', current_A: [0, 2], inductance_H: [1, 1] } as const;
  const unit = { serial: 'U-1', measuredAt: '2026-01-05T08:00:00Z', instrument: {}, sweep };

  it('do not take a sweep that ends early for a part without energy', () => {
    const { cautions } = evaluate({ part, duty: { peakCurrent_A: 10 }, evidence: { units: [unit] } });
    // ½ · 1 H · (10 A)² = 50 J
    expect(codesOf(cautions)).toEqual(['stored-energy', 'hazardous-energy']);
    expect(cautions[0]!.text).toContain('50 J');
  });

  it('fall back on the drawing where nothing else is known', () => {
    const drawing = { inductance: { nominal_H: 1, lower_H: 0.9, upper_H: 1.1 } };
    expect(codesOf(evaluate({ part: { ...part, drawing }, duty: { peakCurrent_A: 10 } }).cautions)).toContain(
      'hazardous-energy',
    );
  });

  const winding = { turns: 50, meanTurnLength_m: 0.1, wireDiameter_m: 0.001 };
  const coil = {
    shape: 'cored',
    turns: 50,
    core: {
      effectiveArea_m2: 1e-4,
      effectiveLength_m: 0.1,
      material: { initialPermeability: 60, saturation: { fluxDensity_T: 1 } },
    },
  } as const;
  const hot: ApprovalRequest = {
    part: { ...part, construction: { coil, winding, cooling: { thermalResistance_K_per_W: 20 } } },
    duty: { peakCurrent_A: 8, rmsCurrent_A: 7, ambient_degC: 40, hotspotLimit_degC: 600 },
  };

  it('tell of a part that gets hot, calculated or as the duty states its core', () => {
    expect(codesOf(evaluate(hot).cautions)).toContain('hot-surface');
    expect(codesOf(evaluate({ ...hot, duty: { peakCurrent_A: 1, coreTemperature_degC: 90 } }).cautions)).toContain(
      'hot-surface',
    );
    expect(codesOf(evaluate({ ...hot, duty: { peakCurrent_A: 1, coreTemperature_degC: 40 } }).cautions)).not.toContain(
      'hot-surface',
    );
  });

  it('and the hot spot stays open while the core loses an unknown power', () => {
    const temperatureOf = (request: ApprovalRequest) =>
      evaluate(request).checks.find(({ check }) => check === 'temperature-rise')!;
    expect(temperatureOf(hot).outcome).toBe('pass');
    const rippling = temperatureOf({ ...hot, duty: { ...hot.duty, rippleCurrent_A: 1, frequency_Hz: 20_000 } });
    expect([rippling.outcome, rippling.detail]).toEqual(['inconclusive', expect.stringContaining('states no loss')]);
  });
});
