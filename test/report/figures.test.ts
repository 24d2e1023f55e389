import { describe, expect, it } from 'vitest';
import { histogram } from '../../src/report/histogram.ts';
import { lotFan } from '../../src/report/lot-fan.ts';
import { trend } from '../../src/report/trend.ts';
import { unitCurve } from '../../src/report/unit-curve.ts';
import { CHOKE, HISTOGRAM, LOT, TREND } from './examples.ts';
import { allOf, parsed } from './well-formed.ts';

const NOTHING = { current_A: [], inductance_H: [] };
const NASTY = `<b>&amp;"'\u0000\ud800]]> {a|b} url(#zr0-c0) class="zr0-cls-0"`;
/** What is left of it: control characters and lone surrogates are not XML. */
const NASTY_READ = NASTY.replace('\u0000', ' ').replace('\ud800', '\ufffd');

const days = (n: number) =>
  Array.from({ length: n }, (_, i) => ({
    name: `2026-${i + 101}`,
    n: 40 + i,
    mean: 47e-6 + (i % 7) * 1e-7,
    standardDeviation: 1e-6,
  }));

const FIGURES: Record<string, string> = {
  'unit-curve': unitCurve(CHOKE),
  'unit-curve-not-reached': unitCurve({
    ...CHOKE,
    dropCurrent: { current_A: 20, atLeast: true },
    limits: {
      inductance: { lower_H: 30e-6, upper_H: 51.7e-6, testCurrent_A: 13 },
      saturation: { inductanceDrop: 0.3, current_A: 24 },
    },
  }),
  'unit-curve-empty': unitCurve({ ...CHOKE, measured: NOTHING, curve: NOTHING }),
  'lot-fan': lotFan(LOT),
  histogram: histogram(HISTOGRAM),
  'histogram-one-sided': histogram({ ...HISTOGRAM, limits: { lower: 46.5e-6 }, mean: 46.6e-6, below: 0, above: 0 }),
  'histogram-narrow': histogram({
    label: 'resistance',
    unit: 'Ω',
    edges: [0, 1, 2, 3, 4].map((i) => 1e6 + i * 1e-3),
    counts: [1, 2, 1, 1],
    below: 0,
    above: 0,
    limits: {},
    n: 5,
    mean: 1e6 + 1.9e-3,
    standardDeviation: 1.1e-3,
  }),
  trend: trend(TREND),
  'trend-days': trend({ ...TREND, by: 'day', groups: days(20) }),
  'trend-many': trend({ ...TREND, by: 'day', groups: days(80) }),
  'trend-rigs': trend({ ...TREND, by: 'rig', limits: {}, groups: TREND.groups.slice(0, 3) }),
};

const textsOf = (svg: string) =>
  allOf(parsed(svg))
    .filter(({ name }) => name === 'text')
    .map(({ text }) => text);

const dashesOf = (svg: string) =>
  new Set(allOf(parsed(svg)).flatMap(({ attributes }) => attributes['stroke-dasharray'] ?? []));

describe.each(Object.entries(FIGURES))('%s', (name, svg) => {
  it('is as it was when it was last looked at', () => expect(svg).toMatchFileSnapshot(`snapshots/${name}.svg`));

  it('is well-formed, titled, described and without broken numbers', () => {
    const root = parsed(svg);
    expect(root.name).toBe('svg');
    expect(root.attributes.role).toBe('img');
    const [title, description] = root.children;
    expect([title?.name, description?.name]).toEqual(['title', 'desc']);
    expect(title?.text).not.toBe('');
    expect(description?.text).not.toBe('');
    expect(root.attributes['aria-labelledby']).toBe(`${title?.attributes.id} ${description?.attributes.id}`);
    expect(svg).not.toMatch(/NaN|undefined|null|Infinity|\[object/);
  });

  it('keeps all text inside the picture and apart', () => {
    const boxes = allOf(parsed(svg)).flatMap(({ name: element, attributes, text }) => {
      const [, x, y] = /translate\(([-\d.]+) ([-\d.]+)\)/.exec(attributes.transform ?? '') ?? [];
      if (element !== 'text' || x === undefined) return [];
      const size = Number(/(\d+)px/.exec(attributes.style ?? '')?.[1]);
      const width = text.length * size * 0.55;
      const start = Number(x) - width * { start: 0, middle: 0.5, end: 1 }[attributes['text-anchor'] ?? 'start']!;
      const middle = Number(y) + Number(attributes.y ?? 0);
      return [{ text, left: start, right: start + width, top: middle - size / 2, bottom: middle + size / 2 }];
    });
    for (const [i, a] of boxes.entries()) {
      expect(a.left, a.text).toBeGreaterThanOrEqual(0);
      expect(a.right, a.text).toBeLessThanOrEqual(640);
      expect(a.bottom, a.text).toBeLessThanOrEqual(400);
      for (const b of boxes.slice(i + 1)) {
        const overlap = a.left < b.right && b.left < a.right && a.top + 1 < b.bottom && b.top + 1 < a.bottom;
        expect(overlap, `${a.text} over ${b.text}`).toBe(false);
      }
    }
  });

  it('has no colours', () => {
    const inks = allOf(parsed(svg)).flatMap(({ attributes: { fill, stroke } }) => [fill, stroke].filter((ink) => ink));
    for (const ink of new Set(inks)) expect(ink).toMatch(/^(none|#([0-9a-f]{1,2})\2\2)$/i);
  });
});

describe('equal data', () => {
  it('gives equal text, however many figures were drawn before', () => {
    expect(unitCurve(CHOKE)).toBe(FIGURES['unit-curve']);
    expect(lotFan(LOT)).toBe(FIGURES['lot-fan']);
    expect(histogram(HISTOGRAM)).toBe(FIGURES.histogram);
    expect(trend(TREND)).toBe(FIGURES.trend);
  });
});

describe('ids', () => {
  it('begin with the one that is passed in, and are unique', () => {
    const ids = allOf(parsed(lotFan(LOT, { id: 'lot 7 "fan"' }))).flatMap(({ attributes }) => attributes.id ?? []);
    expect(ids.length).toBeGreaterThan(2);
    expect(new Set(ids).size).toBe(ids.length);
    for (const id of ids) expect(id).toMatch(/^lot-7--fan--/);
  });

  it('are what clip paths refer to', () => {
    const elements = allOf(parsed(lotFan(LOT)));
    const ids = new Set(elements.flatMap(({ attributes }) => attributes.id ?? []));
    const references = elements.flatMap(
      ({ attributes }) => /#([^)]+)\)/.exec(attributes['clip-path'] ?? '')?.[1] ?? [],
    );
    expect(references.length).toBeGreaterThan(0);
    for (const reference of references) expect(ids).toContain(reference);
  });
});

describe('text from outside', () => {
  it.each([
    ['unit curve', unitCurve({ ...CHOKE, serial: NASTY })],
    ['lot fan', lotFan({ ...LOT, lot: NASTY })],
    ['histogram', histogram({ ...HISTOGRAM, label: NASTY })],
    ['trend', trend({ ...TREND, label: NASTY })],
    ['empty figure', lotFan({ ...LOT, lot: NASTY, current_A: [] })],
  ])('stays text in the %s', (_, svg) => {
    expect(parsed(svg).children[0]?.text).toContain(NASTY_READ);
  });

  it('stays text in the names of groups', () => {
    const svg = trend({ ...TREND, groups: [{ name: '<&">', n: 2, mean: 47e-6 }] });
    expect(textsOf(svg)).toContain('<&">');
  });

  it('is shortened where it would not fit, and whole in the title', () => {
    const serial = 'S'.repeat(300);
    const svg = unitCurve({ ...CHOKE, serial });
    expect(parsed(svg).children[0]?.text).toContain(serial);
    expect(textsOf(svg).filter((text) => /SS…$/.test(text))).toHaveLength(1);
  });
});

describe('lines', () => {
  it('differ by their dashes', () => {
    // required current, drop level, drop current found, ends of the band
    expect(dashesOf(FIGURES['unit-curve']!).size).toBe(4);
    // quartiles, tails, required current, drop level, ends of the band
    expect(dashesOf(FIGURES['lot-fan']!).size).toBe(5);
    expect(dashesOf(FIGURES.histogram!).size).toBe(2);
  });

  it('join the means of days and not those of rigs', () => {
    const joining = (by: 'day' | 'rig') =>
      allOf(parsed(trend({ ...TREND, by, limits: {} }))).filter(({ attributes }) => attributes['stroke-dasharray']);
    expect(joining('day')).toHaveLength(1);
    expect(joining('rig')).toHaveLength(0);
  });
});

describe('numbers in labels come from the data', () => {
  it('in the unit curve', () => {
    const texts = textsOf(FIGURES['unit-curve']!).join('\n');
    for (const words of [
      '≤ 51.7 µH at 0 A',
      '≥ 42.3 µH at 0 A',
      '0.7·L₀ = 33.60 µH',
      'required ≥ 12.5 A',
      'found 14.56 A',
    ]) {
      expect(texts).toContain(words);
    }
    expect(texts).toContain('unit A-0001, lot L2026-31');
    expect(texts).toContain('current [A]');
    expect(texts).toContain('differential inductance [µH]');
  });

  it('in the unit curve whose sweep ended early', () => {
    const texts = textsOf(FIGURES['unit-curve-not-reached']!).join('\n');
    expect(texts).toContain('drop current (30 %) above 20.00 A (end of sweep)');
    expect(texts).not.toContain('found');
  });

  it('in the unit curve of points alone', () => {
    expect(textsOf(unitCurve({ ...CHOKE, curve: NOTHING }))).toContain('○ measured');
  });

  it('in the fan', () => {
    const texts = textsOf(FIGURES['lot-fan']!);
    for (const words of ['95 %', '75 %', 'median', '25 %', '5 %']) expect(texts).toContain(words);
    expect(texts.join('\n')).toContain('n = 1480 units');
  });

  it('in the histogram', () => {
    const texts = textsOf(FIGURES.histogram!).join('\n');
    for (const words of ['lower limit 42.3 µH', 'mean 46.93 µH', 'upper limit 51.7 µH', 'n = 1477', 's = 1.235 µH']) {
      expect(texts).toContain(words);
    }
    expect(texts).toContain('Cpk = 1.25 (95 %: 1.20 to 1.30)');
    expect(texts).toContain('2 below 42 µH, 5 above 51.6 µH');
    expect(textsOf(FIGURES['histogram-narrow']!).join('\n')).toContain('mean = 1.00000000190 MΩ');
  });

  it('in the trend', () => {
    const texts = textsOf(FIGURES.trend!);
    for (const words of ['L2026-26', 'n = 1480', 'n = 1', 'upper limit 51.7 µH', 'lower limit 42.3 µH']) {
      expect(texts).toContain(words);
    }
  });
});

describe('what is drawn is where its axis says', () => {
  it('for the bars of the histogram', () => {
    const bars = allOf(parsed(FIGURES.histogram!)).filter(({ attributes }) => attributes.fill === '#c9c9c9');
    expect(bars).toHaveLength(HISTOGRAM.counts.filter((count) => count > 0).length);
    const heights = bars.map(({ attributes }) => Math.abs(Number(/0l0 (-?[\d.]+)/.exec(attributes.d ?? '')?.[1])));
    const counts = HISTOGRAM.counts.filter((count) => count > 0);
    heights.forEach((height, i) => {
      expect(height / Math.max(...heights)).toBeCloseTo(counts[i]! / Math.max(...counts), 2);
    });
  });
});

describe('nothing to draw', () => {
  it.each([
    ['unit curve', unitCurve({ ...CHOKE, measured: NOTHING, curve: NOTHING }), 'No measured points'],
    [
      'unit curve of no numbers',
      unitCurve({ ...CHOKE, measured: { current_A: [1], inductance_H: [NaN] }, curve: NOTHING }),
      'No measured points',
    ],
    [
      'lot fan',
      lotFan({ ...LOT, current_A: [], quantiles: { p05: [], p25: [], p50: [], p75: [], p95: [] } }),
      'No measured units',
    ],
    ['histogram', histogram({ ...HISTOGRAM, edges: [], counts: [], below: 0, above: 0 }), 'No values'],
    [
      'histogram of no units',
      histogram({ ...HISTOGRAM, counts: HISTOGRAM.counts.map(() => 0), below: 0, above: 0 }),
      'No values',
    ],
    ['trend', trend({ ...TREND, groups: [] }), 'No groups'],
  ])('is said in the %s', (_, svg, words) => {
    expect(textsOf(svg).join('\n')).toContain(words);
  });
});

describe('one value alone', () => {
  it.each([
    [
      'unit curve',
      unitCurve({ serial: 'x', measured: { current_A: [0], inductance_H: [0] }, curve: NOTHING, limits: {} }),
    ],
    [
      'lot fan',
      lotFan({
        lot: 'x',
        n: 1,
        current_A: [0],
        quantiles: { p05: [1], p25: [1], p50: [1], p75: [1], p95: [1] },
        limits: {},
      }),
    ],
    [
      'histogram',
      histogram({ label: 'x', unit: '1', edges: [0, 0], counts: [1], below: 0, above: 0, limits: {}, n: 1, mean: 0 }),
    ],
    [
      'histogram of negative values',
      histogram({
        label: 'x',
        unit: '°C',
        edges: [-3, -2],
        counts: [1],
        below: 0,
        above: 0,
        limits: {},
        n: 1,
        mean: -2.5,
      }),
    ],
    ['trend', trend({ ...TREND, groups: [{ name: '', n: 1, mean: 0 }], limits: {} })],
  ])('is drawn in the %s', (_, svg) => {
    expect(svg).not.toMatch(/NaN|undefined|Infinity/);
    expect(parsed(svg).name).toBe('svg');
  });
});

describe('a long sweep', () => {
  it('is thinned, which the caption says', () => {
    const current_A = Array.from({ length: 20_000 }, (_, i) => i / 1000);
    const sweep = { current_A, inductance_H: current_A.map((i) => 48e-6 / (1 + (i / 18) ** 4)) };
    const svg = unitCurve({ ...CHOKE, measured: sweep, curve: sweep });
    expect(svg.length).toBeLessThan(100_000);
    expect(textsOf(svg).join('\n')).toContain('150 of 20000 measured points');
  });
});
