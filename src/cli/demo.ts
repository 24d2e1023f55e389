import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { Approval } from '../approval/approval.ts';
import { compose } from '../compose.ts';
import { readConfig } from '../config/index.ts';
import { GATE_DRIVE_PARTS } from '../demo/gate-drive.ts';
import { inWords, percent } from '../evidence/wording.ts';

/**
 * The main job on the demo's parts: sends each to POST /v1/approvals of a service with a store of its own, and prints the checks
 * and the verdict. Exits 1 where an approval does not come back.
 */
const folder = mkdtempSync(join(tmpdir(), 'coilproof-demo-'));
const service = await compose(readConfig({ DATA_DIR: folder, LOG_LEVEL: 'error' }));
try {
  console.log('Wound parts of the gate drives of a canal lock. Invented parts and measurements.\n');
  for (const request of GATE_DRIVE_PARTS) {
    const answer = await service.app.inject({ method: 'POST', url: '/v1/approvals', payload: request });
    if (answer.statusCode !== 201) throw new Error(`${request.part.number}: ${answer.statusCode} ${answer.body}`);
    console.log(describe(answer.json<Approval>()));
  }
} finally {
  await service.dispose();
  rmSync(folder, { recursive: true });
}

function describe({ part, verdict, reasons, checks, cautions }: Approval): string {
  const rows = checks.map((result) => [
    result.check,
    result.outcome,
    result.observed ? inWords(result.observed.value, result.observed.unit) : '',
    limit(result),
    result.conformanceProbability === undefined ? '' : percent(result.conformanceProbability),
  ]);
  return [
    `${part.number} rev ${part.revision}: ${part.description ?? ''}`,
    ...table(['check', 'outcome', 'observed', 'limit', 'conforms'], rows),
    ...checks.filter(({ outcome }) => outcome !== 'pass').map(({ check, detail }) => `  ${check}: ${detail}`),
    ...cautions.map(({ code, text }) => `  caution (${code}): ${text}`),
    `  VERDICT: ${verdict.toUpperCase()}. ${reasons.join(' ')}`,
    '',
  ].join('\n');
}

function limit({ limit: { lower, upper }, observed }: Approval['checks'][number]): string {
  const words = (value: number) => inWords(value, observed?.unit ?? '');
  return [lower === undefined ? '' : `≥ ${words(lower)}`, upper === undefined ? '' : `≤ ${words(upper)}`]
    .filter(Boolean)
    .join(', ');
}

function table(head: readonly string[], rows: readonly (readonly string[])[]): string[] {
  const widths = head.map((title, column) => Math.max(title.length, ...rows.map((row) => row[column]!.length)));
  const line = (cells: readonly string[]) =>
    `  ${cells.map((cell, column) => cell.padEnd(widths[column]!)).join('  ')}`.trimEnd();
  return [line(head), line(widths.map((width) => '-'.repeat(width))), ...rows.map(line)];
}
