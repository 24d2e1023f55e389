import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { CoilproofError } from '../../../src/errors.ts';
import { type BulkValue, inPlace, isProblem } from '../../../src/http/bulk/bulk-line.ts';
import { csvUnits } from '../../../src/http/bulk/csv.ts';
import { UnitSchema } from '../../../src/http/schemas/approval-request.ts';
import { all, chunked, plain } from './support.ts';

const LIMITS = { lineBytes: 1000, readings: 10_000 };
const units = (body: string | Uint8Array, size?: number, limits = LIMITS) => all(csvUnits(chunked(body, size), limits));
const read = async (body: string | Uint8Array, size?: number, limits = LIMITS) =>
  (await units(body, size, limits)).map(plain);
const refusal = async (body: string | Uint8Array): Promise<CoilproofError> => {
  const error: unknown = await units(body).then(undefined, (thrown) => thrown);
  expect(error).toBeInstanceOf(CoilproofError);
  return error as CoilproofError;
};

interface Dialect {
  readonly name: string;
  readonly body: string;
  readonly units: readonly { readonly sweep: { readonly current_A: readonly number[] } }[];
}
/** Written by another CSV library, with the values in decimal arithmetic. */
const { dialects } = JSON.parse(
  readFileSync(new URL('../../fixtures/python/csv-dialects.json', import.meta.url), 'utf8'),
) as { dialects: readonly Dialect[] };

const HEADER = 'serial,measured at,rig,current [A],inductance [µH],temperature [°C],resistance [mΩ]';
const AT = '2026-12-01T08:00:00Z';
const row = (serial: string, current: number | string, inductance: number | string, rest = ',') =>
  `${serial},${AT},r1,${current},${inductance},${rest}`;
const unit = (serial: string, current_A: number[], inductance_H: number[], rest = {}) => ({
  serial,
  measuredAt: AT,
  rig: 'r1',
  ...rest,
  sweep: { kind: 'differential', current_A, inductance_H },
});

describe('units from CSV', () => {
  describe.each(dialects)('$name', ({ body, units: expected }) => {
    const bytes = Buffer.from(body, 'base64');

    it('are what was written, to the last bit', async () => {
      const found = await read(bytes);
      expect(found.map((item) => 'value' in item && item.value)).toEqual(expected);
      let line = 2;
      for (const [index, { sweep }] of expected.entries()) {
        expect(found[index]!.line).toBe(line);
        line += sweep.current_A.length;
      }
    });

    it('are the same however the body is cut', async () => {
      const whole = await read(bytes);
      for (const size of [1, 2, 3, 5, 64, 1000]) expect(await read(bytes, size)).toEqual(whole);
    });
  });

  it('are the same for a body in two chunks, cut at any byte', async () => {
    const body = Buffer.from(`\uFEFF${HEADER}\r\n${row('Ä"1', 1, 2)}\r\n${row('"Ä, 2"', 1, 47.5, '25,3')}\r\n;\r\n`);
    const whole = await read(body);
    expect(whole).toHaveLength(3);
    for (let cut = 0; cut <= body.length; cut++) {
      const halves = (async function* () {
        yield body.subarray(0, cut);
        yield body.subarray(cut);
      })();
      expect((await all(csvUnits(halves, LIMITS))).map(plain)).toEqual(whole);
    }
  });

  it('fit the schema of a unit', async () => {
    const [found] = await units(`${HEADER}\n${row('1', 0, 47.5, '25,3.3')}\n${row('1', 5, 40, '25,3.3')}\n`);
    expect(UnitSchema.parse((found as BulkValue).value)).toEqual(
      unit('1', [0, 5], [4.75e-5, 4e-5], { temperature_degC: 25, resistance_ohm: 3.3e-3 }),
    );
  });

  it('start at each change of serial or time, and may come again', async () => {
    const other = row('1', 1, 1).replace(AT, '2026-12-01T09:00:00Z');
    const found = await read([HEADER, row('1', 1, 1), row('2', 1, 1), other, row('1', 2, 1)].join('\n'));
    expect(found).toMatchObject([
      { line: 2, value: { serial: '1', measuredAt: AT } },
      { line: 3, value: { serial: '2' } },
      { line: 4, value: { serial: '1', measuredAt: '2026-12-01T09:00:00Z' } },
      { line: 5, value: { serial: '1', measuredAt: AT } },
    ]);
  });

  it('come out as soon as the next one starts', async () => {
    const source = chunked(
      `${HEADER}\n${row('1', 1, 1)}\n${row('1', 2, 1)}\n${row('2', 1, 1)}\n${row('3', 1, 1)}\n`,
      1,
    );
    const first = await csvUnits(source).next();
    expect(first.value).toMatchObject({ line: 2, value: { serial: '1' } });
    expect(source.state.taken).toBe(
      Buffer.byteLength(`${HEADER}\n${row('1', 1, 1)}\n${row('1', 2, 1)}\n${row('2', 1, 1)}\n`),
    );
  });

  it('leave out blank lines, rows of empty cells and trailing empty columns', async () => {
    const body = `${HEADER},,\r\n\r\n${row('1', 1, 1)},,\r\n,,,,,,,,\r\n${row('1', 2, 1)},,,,,\r\n,,,\r\n\r\n`;
    expect(await read(body)).toEqual([{ line: 3, value: unit('1', [1, 2], [1e-6, 1e-6]) }]);
  });

  it('do without the trailing empty cells that some programs leave out', async () => {
    expect(await read(`${HEADER}\n1,${AT},r1,1,1\n1,${AT},r1,2,1`)).toEqual([
      { line: 2, value: unit('1', [1, 2], [1e-6, 1e-6]) },
    ]);
  });

  it('take columns in any order, and what a unit has once from any of its rows', async () => {
    const body = `temperature [K];current [mA];serial;rig;apparent inductance [nH];measured at\n;1;x;;5;${AT}\n298,15;2;x;r1;4;${AT}\n298,150;3;x;r1;3;${AT}`;
    expect(await read(body)).toEqual([
      {
        line: 2,
        value: {
          serial: 'x',
          measuredAt: AT,
          rig: 'r1',
          temperature_degC: 25,
          sweep: { kind: 'apparent', current_A: [1e-3, 2e-3, 3e-3], inductance_H: [5e-9, 4e-9, 3e-9] },
        },
      },
    ]);
  });

  it('take the kind from its column', async () => {
    const body = `serial,measured at,rig,kind,current [A],inductance [H]\n1,${AT},r1,Apparent,1,1\n2,${AT},r1,,1,1\n3,${AT},r1,inverse,1,1\n`;
    expect(await read(body)).toMatchObject([
      { value: { sweep: { kind: 'apparent' } } },
      { value: { sweep: { kind: 'differential' } } },
      { detail: 'line 4, column "kind": "inverse" is neither differential nor apparent' },
    ]);
  });
});

describe('a cell that cannot be read', () => {
  it('is a problem of its unit that names line and column, and the rest goes on', async () => {
    const found = await units(
      [HEADER, row('1', 1, 1), row('2', 1, 1), row('2', '1.5x', ''), row('2', 3, 1), row('3', 1, 1)].join('\n'),
    );
    expect(found.map((item) => item.line)).toEqual([2, 3, 6]);
    const [before, problem, after] = found;
    expect([isProblem(before!), isProblem(after!)]).toEqual([false, false]);
    expect(problem).toMatchObject({
      serial: '2',
      problem: {
        code: 'invalid-body',
        message: 'line 4, column "current [A]": "1.5x" is not a number; line 4, column "inductance [µH]": empty',
        fields: [{ pointer: '/sweep/current_A/1' }, { pointer: '/sweep/inductance_H/1' }],
      },
    });
  });

  it.each([
    [row('1', '"1,5"', 1), 'has a decimal comma, which needs semicolons or tabs'],
    [row('1', '"1,234.5"', 1), 'thousands separators'],
    [row('1', 1, 1, 'warm,'), 'line 2, column "temperature [°C]": "warm" is not a number'],
    [row('1', 1, 1).replace('r1', ''), 'line 2, column "rig": empty'],
  ])('%s: %s', async (text, detail) => {
    expect(await read(`${HEADER}\n${text}`)).toMatchObject([
      { line: 2, code: 'invalid-body', detail: expect.stringContaining(detail) },
    ]);
  });

  it('may be one with the other decimal mark, which could be a thousands separator', async () => {
    const body = `${HEADER.replaceAll(',', ';')}\n1;${AT};r1;1,5;2;;\n2;${AT};r1;1.500;2;;\n3;${AT};r1;2,5;2;;\n`;
    expect(await read(body)).toMatchObject([
      { value: { sweep: { current_A: [1.5] } } },
      {
        code: 'invalid-body',
        detail: expect.stringContaining('"1.500" has the decimal mark that the numbers before it do not'),
      },
      { value: { sweep: { current_A: [2.5] } } },
    ]);
  });

  it('is what contradicts the rows before', async () => {
    const rows = [row('1', 1, 1, '25.0,3'), row('1', 2, 1, '25,3'), row('1', 3, 1, '26,4').replace('r1', 'r2')];
    const [found] = await units([HEADER, ...rows].join('\n'));
    expect(found).toMatchObject({
      problem: {
        fields: [
          { pointer: '/rig', detail: 'line 4, column "rig": "r2" contradicts "r1" on line 2; a unit has one' },
          { pointer: '/temperature_degC', detail: expect.stringContaining('"26" contradicts "25.0" on line 2') },
          { pointer: '/resistance_ohm', detail: expect.stringContaining('"4" contradicts "3" on line 2') },
        ],
      },
    });
  });

  it('is counted beyond the first twenty', async () => {
    const rows = Array.from({ length: 100 }, () => row('1', 'x', 1));
    const [found] = await units([HEADER, ...rows].join('\n'));
    expect(found).toMatchObject({ problem: { message: expect.stringMatching(/; and 97 more$/) } });
    expect(isProblem(found!) && found.problem.fields).toHaveLength(20);
  });
});

describe('a unit with more readings than the limit', () => {
  it('is a problem once, and the next one goes on', async () => {
    const rows = Array.from({ length: 20 }, (_, current) => row('1', current, 1));
    const body = [HEADER, ...rows, row('2', 1, 1)].join('\n');
    expect(await read(body, undefined, { ...LIMITS, readings: 5 })).toMatchObject([
      { line: 2, code: 'invalid-body', detail: 'line 7, column "current [A]": more than 5 readings of one unit' },
      { line: 22, value: { serial: '2' } },
    ]);
  });
});

describe('a row that cannot be read', () => {
  const good = (...serials: string[]) => serials.flatMap((serial) => [row(serial, 1, 1), row(serial, 2, 1)]);

  it.each([
    ['1,"open', 'malformed-request', 'Line 6: a quoted cell is not closed on its line.'],
    [`12" choke,${AT},r1,1,1,,`, 'malformed-request', 'Line 6: a quote inside a cell that is not quoted.'],
    [`,${AT},r1,1,1,,`, 'malformed-request', 'Line 6: no serial, so that its unit is not known.'],
    ['7,,r1,1,1,,', 'malformed-request', 'Line 6: no time of measurement, so that its unit is not known.'],
    [`7,${AT},r1,1,5,47,5,25`, 'malformed-request', expect.stringContaining('Line 6 has 8 cells under 7 headings')],
    ['x'.repeat(2000), 'too-large', 'Line 6 is longer than 1000 bytes.'],
  ])('%s is a problem, as are the units beside it, and the rest goes on', async (bad, code, detail) => {
    const found = await read([HEADER, ...good('1', '2'), bad, ...good('3', '4')].join('\n'));
    expect(found).toMatchObject([
      { line: 2, value: { serial: '1' } },
      {
        line: 4,
        code: 'malformed-request',
        detail: expect.stringContaining('Line 6 cannot be read and may be of this unit'),
      },
      { line: 6, code, detail },
      {
        line: 7,
        code: 'malformed-request',
        detail: expect.stringContaining('Line 6 cannot be read and may be of this unit'),
      },
      { line: 9, value: { serial: '4' } },
    ]);
  });

  it('inside a unit leaves no part of it', async () => {
    const found = await read([HEADER, ...good('1'), '1,"open', ...good('1')].join('\n'));
    expect(found.map((item) => 'value' in item)).toEqual([false, false, false]);
  });

  it('with cells too many is of the unit that it names, where the one before is the same', async () => {
    const found = await read(
      [HEADER, ...good('1'), `2,${AT},r1,1,1,,`, `2,${AT},r1,1,5,47,5,25`, ...good('3')].join('\n'),
    );
    expect(found).toMatchObject([
      { line: 2, value: { serial: '1' } },
      { line: 4, code: 'malformed-request', detail: expect.stringContaining('Line 5 has 8 cells') },
      { line: 6, value: { serial: '3' } },
    ]);
  });

  it('counts as one with the unreadable ones after it', async () => {
    const found = await read([HEADER, ...good('1'), '"', '"', '"', ...good('2'), ...good('3')].join('\n'));
    expect(found.map((item) => item.line)).toEqual([2, 4, 7, 9]);
  });

  it('is one that is not UTF-8', async () => {
    const body = Buffer.concat([
      Buffer.from(`${HEADER}\n`),
      Buffer.from(row('Stück', 1, 1), 'latin1'),
      Buffer.from(`\n${good('2', '3').join('\n')}`),
    ]);
    expect(await read(body)).toMatchObject([
      { line: 2, detail: 'Line 2 is not valid UTF-8.' },
      { line: 3, code: 'malformed-request' },
      { line: 5, value: { serial: '3' } },
    ]);
  });
});

describe('the place of a field', () => {
  it('is its line and column, where the schema refuses what the cell says', async () => {
    const [found] = await units(`${HEADER}\n${row('1', 1, 1)}\n\n${row('1', 2, -1)}\n`);
    const error = new CoilproofError('invalid-body', 'as a schema says it', [
      { pointer: '/sweep/inductance_H/1', detail: 'too small' },
      { pointer: '/measuredAt', detail: 'no time' },
      { pointer: '/sweep/current_A', detail: 'too few' },
      { pointer: '/instrument', detail: 'unknown' },
    ]);
    const placed = inPlace(found as BulkValue, error);
    expect(placed.code).toBe('invalid-body');
    expect(placed.fields).toEqual([
      { pointer: '/sweep/inductance_H/1', detail: 'line 4, column "inductance [µH]": too small' },
      { pointer: '/measuredAt', detail: 'line 2, column "measured at": no time' },
      { pointer: '/sweep/current_A', detail: 'column "current [A]": too few' },
      { pointer: '/instrument', detail: 'unknown' },
    ]);
  });
});

describe('the header', () => {
  const body = (header: string, separator = ',') =>
    `${header}\n1${separator}${AT}${separator}r1${separator}1${separator}2\n`;
  const SHORT = ['serial', 'measured at', 'rig', 'current [A]', 'inductance [H]'];

  it.each([
    ['comma', SHORT.join(','), ','],
    ['semicolon', SHORT.join(';'), ';'],
    ['tab', SHORT.join('\t'), '\t'],
    ['quoted', SHORT.map((heading) => `"${heading}"`).join(';'), ';'],
    ['announced', `sep=;\r\n${SHORT.join(';')}`, ';'],
    ['after blank lines', `\n\n${SHORT.join(',')}`, ','],
    ['over several lines', `serial;"measured\nat";rig;"current\r\n[A]";"inductance [H]"`, ';'],
  ])('says the separator: %s', async (_, header, separator) => {
    expect(await read(body(header, separator))).toMatchObject([
      { value: { serial: '1', measuredAt: AT, rig: 'r1', sweep: { current_A: [1], inductance_H: [2] } } },
    ]);
  });

  it.each([
    [`${SHORT.join(',')},remark`, ['/remark']],
    [SHORT.slice(0, 4).join(','), ['/inductance [µH]']],
    [SHORT.slice(1).join(','), ['/serial']],
    [SHORT.join(',').replace(' [A]', ''), ['/current']],
    [SHORT.join(',').replace('[H]', '[furlong]'), ['/inductance [furlong]']],
    [`${SHORT.join(',')},Serial`, ['/Serial']],
    [`${SHORT.join(',')},apparent inductance [mH]`, ['/apparent inductance [mH]']],
    [SHORT.join(',').replace('rig', ''), ['/', '/rig']],
    [`${SHORT.join(',').replace('inductance', 'apparent inductance')},kind`, ['/kind']],
    ['a,b', ['/a', '/b', '/serial', '/measured at', '/rig', '/current [A]', '/inductance [µH]']],
    ['{"serial":"1"}', expect.any(Array)],
  ])('%s is refused for the whole body', async (header, pointers) => {
    const error = await refusal(body(header));
    expect(error.code).toMatch(/invalid-body|malformed-request/);
    if (error.code === 'invalid-body') expect(error.fields.map(({ pointer }) => pointer)).toEqual(pointers);
  });

  it.each([
    ['', 'empty'],
    ['\n\r\n', 'empty'],
    ['sep=;\n', 'empty'],
    ['serial,"measured', 'not closed'],
    [`serial,"measured${'\n\n'.repeat(3)}${'x\n'.repeat(200)}`, 'not closed'],
    ['serial"x",measured at', 'a quote inside a cell'],
    [SHORT.join(',').concat('\r1\r2'), 'The lines end in CR'],
    [','.repeat(300).concat('x'), '301 columns'],
    ['x'.repeat(2000), 'longer than 1000 bytes'],
    [Buffer.from(`\uFEFF${SHORT.join('\t')}\n`, 'utf16le'), 'UTF-16'],
    [Buffer.from(`${SHORT.join(',')},Gerät\n`, 'latin1'), 'not valid UTF-8'],
  ])('%j is none', async (text, detail) => {
    const error = await refusal(text);
    expect(error.code).toMatch(/malformed-request|too-large/);
    expect(error.message).toContain(detail);
  });

  it('names the columns in one sentence', async () => {
    const error = await refusal(body('serial,measured at,rig,current,inductance [H],remark'));
    expect(error.message).toBe(
      'The header does not fit: "current" needs its unit in square brackets: A, mA, µA, nA or kA; "remark" is not a column that is read here.',
    );
  });
});
