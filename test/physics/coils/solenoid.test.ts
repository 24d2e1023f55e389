import { describe, expect, it } from 'vitest';
import { type Solenoid, solenoidInductance } from '../../../src/physics/coils/solenoid.ts';
import { VACUUM_PERMEABILITY_H_PER_M } from '../../../src/physics/constants.ts';
import { InvalidQuantity } from '../../../src/physics/invalid-quantity.ts';
import helix from '../../fixtures/scipy/helix.json' with { type: 'json' };
import rings from '../../fixtures/scipy/rings.json' with { type: 'json' };

const solenoid = (turns: number, diameter_m: number, length_m: number, wireDiameter_m?: number): Solenoid => ({
  shape: 'solenoid',
  turns,
  diameter_m,
  length_m,
  ...(wireDiameter_m === undefined ? {} : { wireDiameter_m }),
});
const refusal = (coil: Solenoid): string => {
  try {
    solenoidInductance(coil);
  } catch (error) {
    if (error instanceof InvalidQuantity) return error.pointer;
    throw error;
  }
  return 'accepted';
};

describe('solenoid of round wire', () => {
  it('is within 5e-4 of the ring sum, 1 to 1000 turns, coil/wire from 3 up, pitch/wire 1 to 10', () => {
    let worst = 0;
    let count = 0;
    for (const [turns, pitch, ratio, expected] of rings as [number, number, number, number, number][]) {
      if (ratio > 0.34) continue;
      count++;
      const { inductance_H } = solenoidInductance(solenoid(turns, 2, turns * pitch, 2 * ratio));
      worst = Math.max(worst, Math.abs(inductance_H / VACUUM_PERMEABILITY_H_PER_M / expected - 1));
    }
    expect(count).toBe(264);
    expect(worst).toBeLessThan(1e-5);
  });

  it('states an error that covers a helix, and is not idle', () => {
    expect(helix.length).toBe(288);
    for (const [turns, pitch, ratio, difference] of helix as [number, number, number, number][]) {
      const { relativeError } = solenoidInductance(solenoid(turns, 2, turns * pitch, 2 * ratio)).method;
      expect(relativeError, `${turns} turns, pitch ${pitch}, wire ${ratio}`).toBeGreaterThan(Math.abs(difference));
      // Where the helix matters most it is most of the error.
      if (turns >= 30 && pitch > 0.1) expect(relativeError).toBeLessThan(4 * Math.abs(difference));
    }
  });

  it('states an error that covers a direct current’s own distribution, 1/r', () => {
    for (const [turns, pitch, ratio, uniform, direct] of rings as [number, number, number, number, number][]) {
      const { relativeError } = solenoidInductance(solenoid(turns, 2, turns * pitch, 2 * ratio)).method;
      expect(relativeError, `${turns} turns, pitch ${pitch}, wire ${ratio}`).toBeGreaterThan(1 - direct / uniform);
    }
  });

  it('tends to the sheet as its turns grow finer', () => {
    // Same cylinder, filled by ever more close-wound turns: the wire's correction falls as 1/N.
    const sheetPerTurn2 = solenoidInductance(solenoid(1, 0.1, 0.2)).inductance_H;
    let previous = 1;
    for (const turns of [10, 100, 1000, 10000]) {
      const { inductance_H } = solenoidInductance(solenoid(turns, 0.1, 0.2, 0.2 / turns));
      const difference = Math.abs(inductance_H / turns ** 2 / sheetPerTurn2 - 1);
      expect(difference).toBeLessThan(previous / 5);
      previous = difference;
    }
  });

  it('takes turns that touch and refuses what does not fit', () => {
    expect(refusal(solenoid(10, 0.02, 10 * 0.0013, 0.0013))).toBe('accepted');
    expect(refusal(solenoid(3, 0.02, 0.1 + 0.2, 0.1 - 1e-17))).toBe('/wireDiameter_m');
    expect(refusal(solenoid(10, 0.02, 0.0129, 0.0013))).toBe('/length_m');
    expect(refusal(solenoid(10, 0.002, 0.1, 0.002))).toBe('/wireDiameter_m');
    expect(refusal(solenoid(10, 0.002, 0.1, 0.0019))).toBe('accepted');
  });
});

describe('solenoid as a current sheet', () => {
  it('states an error that covers round wire at a pitch of one to four wire diameters', () => {
    for (const [turns, pitch, ratio] of rings as [number, number, number, number, number][]) {
      if (ratio > 0.34 || pitch / ratio > 7) continue;
      const sheet = solenoidInductance(solenoid(turns, 2, turns * pitch));
      const wire = solenoidInductance(solenoid(turns, 2, turns * pitch, 2 * ratio));
      const difference = Math.abs(sheet.inductance_H - wire.inductance_H) / sheet.inductance_H;
      expect(difference, `${turns} turns, pitch ${pitch}, wire ${ratio}`).toBeLessThan(sheet.method.relativeError);
    }
  });

  it('published: 500 turns on 15 mm over 40 mm, 1.39 mH by the endless formula (OpenStax, College Physics 2e, ch. 23)', () => {
    const { inductance_H } = solenoidInductance(solenoid(500, 0.015, 0.04));
    // The end effect that the textbook leaves out: Nagaoka's coefficient of 0.375, between his 0.35 and 0.40.
    expect(inductance_H / 1.39e-3).toBeGreaterThan(0.85);
    expect(inductance_H / 1.39e-3).toBeLessThan(0.87);
  });
});
