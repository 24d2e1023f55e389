import { CoilproofError, type ErrorCode, type FieldError } from '../../errors.ts';
import { type BulkLine, summary } from './bulk-line.ts';
import type { ColumnName } from './csv-columns.ts';
import type { CsvHeader } from './csv-header.ts';
import type { Cell, CsvRow } from './csv-row.ts';
import { quoted } from './decimal.ts';

/** Failures that are spelt out for one unit; the rest is counted. */
const MAXIMUM_FIELDS = 20;

/** The field that a column fills; of a reading, the array. */
const POINTERS: Readonly<Record<ColumnName, string>> = {
  serial: '/serial',
  measuredAt: '/measuredAt',
  rig: '/rig',
  kind: '/sweep/kind',
  current: '/sweep/current_A',
  inductance: '/sweep/inductance_H',
  temperature: '/temperature_degC',
  resistance: '/resistance_ohm',
};
const CONSTANTS = ['rig', 'kind', 'temperature', 'resistance'] as const;

interface Constant {
  readonly value: string | number;
  readonly text: string;
  readonly line: number;
}

/** One unit, row by row. */
export class CsvUnit {
  readonly #header: CsvHeader;
  readonly #maximumReadings: number;
  readonly #first: CsvRow;
  readonly #lines: number[] = [];
  readonly #current: number[] = [];
  readonly #inductance: number[] = [];
  readonly #constants: Partial<Record<ColumnName, Constant>> = {};
  readonly #failures: FieldError[] = [];
  #failed = 0;
  #code: ErrorCode = 'invalid-body';
  #bytes = 0;
  #overfull = false;
  #misfitsOnly = true;

  constructor(first: CsvRow, header: CsvHeader, maximumReadings: number) {
    this.#header = header;
    this.#maximumReadings = maximumReadings;
    this.#first = first;
    this.add(first);
  }

  get line(): number {
    return this.#first.line;
  }

  /** Whether no row has shown yet that a unit of this serial and time is there at all. */
  get isDoubtful(): boolean {
    return this.#misfitsOnly;
  }

  /** Whether the row is of this unit: the same serial and time, as written. Unreadable rows in succession count as one unit. */
  takes({ serial, measuredAt }: CsvRow): boolean {
    return serial === this.#first.serial && measuredAt === this.#first.measuredAt;
  }

  add(row: CsvRow): void {
    this.#bytes += row.bytes;
    if (row.misfit) {
      this.#fail(row.misfit.code, '', row.misfit.detail);
      return;
    }
    this.#misfitsOnly = false;
    if (this.#lines.length === this.#maximumReadings) {
      this.#refuseFurther(row);
      return;
    }
    const index = this.#lines.push(row.line) - 1;
    for (const name of CONSTANTS) this.#agree(name, row);
    this.#reading('current', index, row, this.#current);
    this.#reading('inductance', index, row, this.#inductance);
  }

  /** A row beside this unit could not be read and may have been one of it, so that this sweep may not be whole. */
  doubt(line: number): void {
    if (this.#failed > 0) return;
    this.#fail('malformed-request', '', `Line ${line} cannot be read and may be of this unit; send both again.`);
  }

  finish(): BulkLine {
    const { line, serial, measuredAt } = this.#first;
    const { rig, kind, temperature, resistance } = this.#constants;
    if (!rig && !this.#misfitsOnly) this.#refuse('rig', POINTERS.rig, line, 'empty');
    if (this.#failed > 0) {
      const problem = new CoilproofError(this.#code, summary(this.#failures, this.#failed), this.#namedFailures());
      return { line, problem, bytes: this.#bytes, ...(serial !== undefined && { serial }) };
    }
    const value = {
      serial,
      measuredAt,
      rig: rig!.value,
      ...(temperature && { temperature_degC: temperature.value }),
      ...(resistance && { resistance_ohm: resistance.value }),
      sweep: {
        kind: kind?.value ?? this.#header.kind,
        current_A: this.#current,
        inductance_H: this.#inductance,
      },
    };
    return { line, value, bytes: this.#bytes, place: (pointer) => this.#placeOf(pointer) };
  }

  #reading(name: 'current' | 'inductance', index: number, { line, cells }: CsvRow, values: number[]): void {
    const cell = cells[name]!;
    if (cell.reason !== undefined) this.#refuse(name, `${POINTERS[name]}/${index}`, line, cell.reason);
    else values.push(cell.value as number);
  }

  /** What a unit has once may stand in any of its rows, in several the same. */
  #agree(name: (typeof CONSTANTS)[number], { line, cells }: CsvRow): void {
    const cell: Cell | undefined = cells[name];
    if (!cell) return;
    const earlier = this.#constants[name];
    if (cell.reason !== undefined) this.#refuse(name, POINTERS[name], line, cell.reason);
    else if (!earlier) this.#constants[name] = { value: cell.value, text: cell.text, line };
    else if (earlier.value !== cell.value) {
      const detail = `${quoted(cell.text)} contradicts ${quoted(earlier.text)} on line ${earlier.line}; a unit has one`;
      this.#refuse(name, POINTERS[name], line, detail);
    }
  }

  #refuseFurther({ line }: CsvRow): void {
    if (this.#overfull) return;
    this.#overfull = true;
    this.#refuse('current', POINTERS.current, line, `more than ${this.#maximumReadings} readings of one unit`);
  }

  #refuse(name: ColumnName, pointer: string, line: number, detail: string): void {
    this.#fail('invalid-body', pointer, `line ${line}, column ${this.#headingOf(name)}: ${detail}`);
  }

  #fail(code: ErrorCode, pointer: string, detail: string): void {
    if (this.#failed++ === 0) this.#code = code;
    if (this.#failures.length < MAXIMUM_FIELDS) this.#failures.push({ pointer, detail });
  }

  #namedFailures(): FieldError[] {
    return this.#failures.filter(({ pointer }) => pointer !== '');
  }

  #placeOf(pointer: string): string | undefined {
    const [, array = pointer, index] = /^(.*)\/(\d+)$/.exec(pointer) ?? [];
    const [name] = Object.entries(POINTERS).find(([, field]) => field === array) ?? [];
    if (name === undefined || !this.#header.columns[name as ColumnName]) return undefined;
    const column = `column ${this.#headingOf(name as ColumnName)}`;
    if (name === 'current' || name === 'inductance') {
      return index === undefined ? column : `line ${this.#lines[Number(index)] ?? this.line}, ${column}`;
    }
    return `line ${this.#constants[name as ColumnName]?.line ?? this.line}, ${column}`;
  }

  #headingOf(name: ColumnName): string {
    return quoted(this.#header.columns[name]!.heading);
  }
}
