import { describe, expect, it } from 'vitest';
import { axisOver } from '../../src/report/axis.ts';
import { spread } from '../../src/report/placing.ts';

describe('axisOver', () => {
  it.each([
    [[0, 48e-6], 'H', 'L [µH]', ['0', '10', '20', '30', '40', '50']],
    [[0.0123, 0.0131], 'Ω', 'L [mΩ]', ['12.2', '12.4', '12.6', '12.8', '13.0', '13.2']],
    [[-40, 125], '°C', 'L [°C]', ['−50', '0', '50', '100', '150']],
    [[1500, 9200], 'A', 'L [kA]', ['0', '2', '4', '6', '8', '10']],
    [[0, 3.1], '1', 'L', ['0.0', '0.5', '1.0', '1.5', '2.0', '2.5', '3.0', '3.5'].with(0, '0')],
  ] as const)('%j in %s', (values, unit, title, labels) => {
    const axis = axisOver(values, { label: 'L', unit });
    expect(axis.title).toBe(title);
    expect(axis.tickLabels).toEqual(labels);
  });

  it.each([1e-12, 1e-9, 1e-6, 1, 1e3, 1e9])('covers its values with round ticks at a scale of %d', (scale) => {
    for (const [low, high] of [
      [0.1, 0.7],
      [1, 1.0001],
      [-3, 8],
      [1e6, 1e6 + 1e-2],
      [5, 5],
    ] as const) {
      const axis = axisOver([low * scale, high * scale], { label: 'x', unit: 'V' });
      expect(axis.position(low * scale)).toBeGreaterThanOrEqual(-1e-4);
      expect(axis.position(high * scale)).toBeLessThanOrEqual(axis.tickLabels.length - 1 + 1e-4);
      expect(axis.tickLabels.length).toBeGreaterThanOrEqual(2);
      expect(axis.tickLabels.length).toBeLessThanOrEqual(9);
      expect(new Set(axis.tickLabels).size).toBe(axis.tickLabels.length);
    }
  });

  it('counts in whole units', () => {
    expect(axisOver([1], { label: 'n', unit: '1', fromZero: true, integers: true }).tickLabels).toEqual(['0', '1']);
  });

  it('writes limits as they were given and means by their spread', () => {
    const axis = axisOver([90e-6, 100.05e-6], { label: 'L', unit: 'H' });
    expect(axis.words(100.05e-6)).toBe('100.05 µH');
    expect(axis.words(97.123456e-6, 0.31e-6)).toBe('97.123 µH');
  });
});

describe('spread', () => {
  it('leaves what is apart where it is', () => {
    expect(
      spread(
        [
          { at: 50, size: 10 },
          { at: 20, size: 10 },
        ],
        0,
        100,
      ),
    ).toEqual([50, 20]);
  });

  it('parts what would overlap by as little as it can', () => {
    expect(
      spread(
        [
          { at: 50, size: 10 },
          { at: 50, size: 20 },
          { at: 90, size: 4 },
        ],
        0,
        100,
      ),
    ).toEqual([42.5, 57.5, 90]);
  });

  it('keeps to the ends, and pools once more where that makes an overlap', () => {
    expect(
      spread(
        [
          { at: 1, size: 10 },
          { at: 12, size: 10 },
        ],
        0,
        100,
      ),
    ).toEqual([5, 15]);
    expect(
      spread(
        [
          { at: 99, size: 10 },
          { at: 98, size: 10 },
          { at: 88, size: 10 },
        ],
        0,
        100,
      ),
    ).toEqual([95, 85, 75]);
  });
});
