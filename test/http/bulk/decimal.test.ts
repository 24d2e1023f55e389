import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { celsiusOfKelvin, decimal } from '../../../src/http/bulk/decimal.ts';

const read = (text: string, power = 0) => {
  const found = decimal(text, power);
  return 'value' in found ? found.value : found.reason;
};

describe('a decimal number', () => {
  it.each([
    ['47.5', -6, 47.5e-6],
    ['47,5', -6, 4.75e-5],
    ['0.1', -3, 1e-4],
    ['-12', 0, -12],
    ['\u221212,5', 0, -12.5],
    ['+3', 3, 3000],
    ['.5', 0, 0.5],
    ['5.', 0, 5],
    ['4,75E+01', -6, 4.75e-5],
    ['1e-3', 3, 1],
    ['0', -9, 0],
  ])('%s times ten to the %i is %d', (text, power, value) => {
    expect(read(text, power)).toBe(value);
  });

  it.each([
    '',
    ' ',
    '.',
    ',',
    '-',
    '1 2',
    '0x10',
    'NaN',
    'Infinity',
    '1e',
    'e5',
    '1..2',
    '1,2,',
    '#DIV/0!',
    '#N/A',
    '12 A',
    '１２',
  ])('is not %j', (text) => {
    expect(read(text)).toMatch(/not a number|empty/);
  });

  it.each(['1.234.567', '1,234.5', '1.234,5', '1 234', "1'234", '1\u202f234,5', '1\u00a0234', '1’234.5'])(
    'does not have thousands separators: %j',
    (text) => {
      expect(read(text)).toContain('thousands separators');
    },
  );

  it('stays finite and short', () => {
    expect(read('1e400')).toContain('out of range');
    expect(read('9'.repeat(100_000))).toContain('not a number');
  });

  it('is the float that JSON reads from the same digits', () => {
    const digits = fc.tuple(fc.bigInt({ min: 0n, max: 10n ** 25n }), fc.integer({ min: 0, max: 30 }));
    fc.assert(
      fc.property(digits, fc.integer({ min: -12, max: 3 }), ([whole, places], power) => {
        const text = `${whole}`.padStart(places + 1, '0');
        const point = text.length - places;
        const written = places === 0 ? text : `${text.slice(0, point)},${text.slice(point)}`;
        expect(read(written, power)).toBe(JSON.parse(`${whole}e${power - places}`));
      }),
      { seed: 2, numRuns: 2000 },
    );
  });
});

describe('kelvin', () => {
  it.each([
    ['298.15', 25],
    ['298,15', 25],
    ['273.15', 0],
    ['0', -273.15],
    ['300', 26.85],
    ['2.9815E+2', 25],
    ['295.3', 22.15],
    ['273.150000000000000000001', 1e-21],
  ])('%s K is %d °C, exactly', (text, value) => {
    expect(celsiusOfKelvin(text)).toMatchObject({ value });
  });

  it('that is no number is refused as one', () => {
    expect(celsiusOfKelvin('warm')).toEqual({ reason: '"warm" is not a number' });
    expect(celsiusOfKelvin('1e9999')).toEqual({ reason: '"1e9999" is out of range' });
    expect(celsiusOfKelvin('1e-9999')).toEqual({ reason: '"1e-9999" is out of range' });
  });
});
