import { describe, expect, it } from 'vitest';
import { columnOf } from '../../../src/http/bulk/csv-columns.ts';

describe('a heading', () => {
  it.each([
    ['serial', 'serial'],
    [' Serial ', 'serial'],
    ['measured at', 'measuredAt'],
    ['measuredAt', 'measuredAt'],
    ['MEASURED_AT', 'measuredAt'],
    ['Rig', 'rig'],
    ['kind', 'kind'],
  ])('%j names %s', (heading, name) => {
    expect(columnOf(heading)).toMatchObject({ name, power: 0 });
  });

  // SI Brochure, 9th edition, table 7: the prefixes' powers of ten
  it.each([
    ['current [A]', 'current', 0],
    ['current [mA]', 'current', -3],
    ['current [kA]', 'current', 3],
    ['current [nA]', 'current', -9],
    ['current [\u00b5A]', 'current', -6],
    ['current [\u03bcA]', 'current', -6],
    ['current [uA]', 'current', -6],
    ['CURRENT [ A ]', 'current', 0],
    ['inductance [H]', 'inductance', 0],
    ['inductance [mH]', 'inductance', -3],
    ['inductance [\u00b5H]', 'inductance', -6],
    ['Inductance[\u03bcH]', 'inductance', -6],
    ['INDUCTANCE [UH]', 'inductance', -6],
    ['inductance\n[nH]', 'inductance', -9],
    ['inductance\u00a0[pH]', 'inductance', -12],
    ['resistance [\u03a9]', 'resistance', 0],
    ['resistance [\u2126]', 'resistance', 0],
    ['resistance [m\u03a9]', 'resistance', -3],
    ['resistance [m\u2126]', 'resistance', -3],
    ['resistance [\u00b5\u2126]', 'resistance', -6],
    ['resistance [k\u03a9]', 'resistance', 3],
    ['resistance [mOhm]', 'resistance', -3],
    ['resistance [ohm]', 'resistance', 0],
  ])('%j is %s times ten to the %i', (heading, name, power) => {
    expect(columnOf(heading)).toMatchObject({ name, power });
  });

  it.each([
    ['temperature [°C]', false],
    ['temperature [\u2103]', false],
    ['temperature [ºC]', false],
    ['Temperature [degC]', false],
    ['temperature [K]', true],
    ['temperature [\u212a]', true],
  ])('%j is in kelvin: %s', (heading, kelvin) => {
    expect(columnOf(heading)).toMatchObject({ name: 'temperature', power: 0, kelvin });
  });

  it.each([
    ['inductance [H]', undefined],
    ['apparent inductance [H]', 'apparent'],
    ['Differential Inductance [H]', 'differential'],
  ])('%j says of the kind: %s', (heading, kind) => {
    expect(columnOf(heading)).toMatchObject({ name: 'inductance' });
    expect((columnOf(heading) as { kind?: string }).kind).toBe(kind);
  });

  it.each(['current', 'inductance', 'temperature', 'resistance'])('%j lacks its unit', (heading) => {
    expect(columnOf(heading)).toContain(`"${heading}" needs its unit in square brackets`);
  });

  it.each([
    'current [V]',
    'current []',
    'current [MA]',
    'inductance [MH]',
    'inductance [\u039cH]', // a capital mu
    'inductance [mF]',
    'resistance [M\u03a9]',
    'resistance [MOHM]',
    'temperature [C]',
    'temperature [°F]',
    'temperature [mK]',
  ])('%j has a unit that is not read', (heading) => {
    expect(columnOf(heading)).toContain('is not one of');
  });

  it.each(['', 'remark', 'inductance (µH)', 'current [A', 'current [A] [A]', 'constructor', '__proto__', 'toString'])(
    '%j is unknown',
    (heading) => {
      expect(columnOf(heading)).toContain('is not a column');
    },
  );

  it('of a text has no unit', () => {
    expect(columnOf('serial [A]')).toContain('is a text');
  });
});
