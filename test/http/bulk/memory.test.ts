import { describe, expect, it } from 'vitest';
import { ndjsonAnswers } from '../../../src/http/bulk/answers.ts';
import { type BulkLine, isProblem } from '../../../src/http/bulk/bulk-line.ts';
import { csvUnits } from '../../../src/http/bulk/csv.ts';
import { inOrder } from '../../../src/http/bulk/in-order.ts';
import { ndjsonLines } from '../../../src/http/bulk/ndjson.ts';
import { bytesAlive } from './support.ts';

const UNITS = 100_000;
const CHUNK = 64 * 1024;
const CURRENTS = [0, 2.5, 5];
const HEADER = 'serial;measured at;rig;current [A];inductance [µH];temperature [°C]\r\n';

const asJson = (index: number) =>
  `${JSON.stringify({
    serial: `S${index}`,
    measuredAt: '2026-12-01T08:00:00Z',
    rig: 'rig-1',
    sweep: { kind: 'differential', current_A: CURRENTS, inductance_H: CURRENTS.map((i) => 47.5e-6 / (1 + i / 10)) },
  })}\n`;
const asCsv = (index: number) =>
  CURRENTS.map(
    (i) => `S${index};2026-12-01T08:00:00Z;rig-1;${`${i}`.replace('.', ',')};${47 + (index % 10)},5;25,0\r\n`,
  ).join('');

/** The bodies' bytes are made as they are asked for; `made` counts them. */
function body(head: string, unitAt: (index: number) => string) {
  const state = { made: 0 };
  async function* chunks() {
    let text = head;
    for (let index = 0; index < UNITS; index++) {
      text += unitAt(index);
      if (text.length < CHUNK && index < UNITS - 1) continue;
      const chunk = Buffer.from(text);
      state.made += chunk.length;
      yield chunk;
      text = '';
    }
  }
  return Object.assign(chunks(), { state });
}

const judge = async (batch: readonly BulkLine[]) => {
  await new Promise(setImmediate); // as a store would, gives others a turn
  return batch.map((item) => ({ line: item.line, outcome: isProblem(item) ? item.problem.code : 'pass' }));
};

describe('a hundred thousand units in one body', () => {
  it.each([
    ['lines of JSON', body('', asJson), ndjsonLines],
    ['CSV', body(HEADER, asCsv), csvUnits],
  ] as const)('%s pass through without memory that grows', async (_, source, read) => {
    const answers = ndjsonAnswers(inOrder(read(source), judge, { batchSize: 200, maxWait: 5 }));
    const alive: number[] = [];
    let lines = 0;
    for await (const chunk of answers) {
      for (const line of `${chunk}`.matchAll(/"(\w+)"}\n/g)) {
        if (line[1] !== 'pass') throw new Error(`not read: ${line[0]}`);
        if (++lines % 20_000 === 0) alive.push(bytesAlive());
      }
    }
    expect(lines).toBe(UNITS);
    expect(source.state.made).toBeGreaterThan(14e6);
    // 80,000 units, 11 MB of their text and more as objects, went through between the first measurement and the last.
    expect(Math.max(...alive.slice(1)) - alive[0]!).toBeLessThan(2e6);
  });

  it('is not read while nobody takes the answers', async () => {
    const source = body('', asJson);
    const answers = ndjsonAnswers(inOrder(ndjsonLines(source), judge, { batchSize: 200, maxWait: 5 }));
    await answers[Symbol.asyncIterator]().next();
    await new Promise((resolve) => setTimeout(resolve, 50));
    // What 16 KiB of answers need, and two batches: some 1000 units of 230 bytes.
    expect(source.state.made).toBeLessThan(8 * CHUNK);
    answers.destroy();
  });
});

describe('a line without end', () => {
  it.each([1, CHUNK])('is not kept, in chunks of %i', async (size) => {
    const length = size === 1 ? 200_000 : 200e6;
    const limit = size === 1 ? 100_000 : 1e6;
    const before = bytesAlive();
    let most = 0;
    const endless = (async function* () {
      yield Buffer.from('1\n');
      for (let sent = 0; sent < length; sent += size) {
        yield Buffer.alloc(size, 'x');
        if (Math.round(sent / size) % (length / size / 20) < 1) most = Math.max(most, bytesAlive() - before);
      }
      yield Buffer.from('\n2\n');
    })();
    const found: BulkLine[] = [];
    for await (const line of ndjsonLines(endless, { lineBytes: limit })) found.push(line);
    expect(found).toMatchObject([{ value: 1 }, { line: 2, problem: { code: 'too-large' } }, { line: 3, value: 2 }]);
    expect(most).toBeGreaterThan(0);
    expect(most).toBeLessThan(20 * limit); // of the 200 MB; what was freed last is not back yet
  });
});
