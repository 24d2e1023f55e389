import type { ErrorCode } from '../../errors.ts';
import { csvCells, quoteMistake } from './csv-cells.ts';
import type { Column, ColumnName } from './csv-columns.ts';
import type { CsvHeader } from './csv-header.ts';
import { celsiusOfKelvin, type Decimal, decimal, quoted } from './decimal.ts';
import type { TextLine } from './line-splitter.ts';

/** A cell's value, or why it has none. An empty cell of a column that need not say something in each row is not there. */
export type Cell = { readonly text: string } & (
  | { readonly value: string | number; readonly reason?: undefined }
  | { readonly reason: string }
);

export interface CsvRow {
  readonly line: number;
  readonly bytes: number;
  /** as written; both absent where it cannot be told which unit the row is of */
  readonly serial?: string;
  readonly measuredAt?: string;
  /** why the row cannot be trusted to be of the unit that it names, if it names one */
  readonly misfit?: { readonly code: ErrorCode; readonly detail: string };
  readonly cells: Readonly<Partial<Record<ColumnName, Cell>>>;
}

/** Reads rows below a header. Remembers the decimal mark that the body uses: the one of its first number that has one. */
export class CsvRowReader {
  readonly #header: CsvHeader;
  #mark: '.' | ',' | '';

  constructor(header: CsvHeader) {
    this.#header = header;
    this.#mark = header.separator === ',' ? '.' : '';
  }

  /** Nothing for a row whose cells are all empty. */
  read(item: TextLine): CsvRow | undefined {
    const { line, bytes } = item;
    if ('problem' in item) {
      const { code, message } = item.problem;
      return { line, bytes, misfit: { code, detail: message }, cells: {} };
    }
    const { separator, width } = this.#header;
    let texts: readonly string[];
    try {
      texts = csvCells(item.text, separator);
    } catch (error) {
      return { line, bytes, misfit: malformed(`Line ${line}: ${quoteMistake(error)}.`), cells: {} };
    }
    const filled = texts.findLastIndex((text) => text !== '') + 1;
    if (filled === 0) return undefined;
    const { serial = '', measuredAt = '' } = this.#texts(texts);
    if (serial === '' || measuredAt === '') {
      const detail = `Line ${line}: no ${serial === '' ? 'serial' : 'time of measurement'}, so that its unit is not known.`;
      return { line, bytes, misfit: malformed(detail), cells: {} };
    }
    if (filled <= width) return { line, bytes, serial, measuredAt, cells: this.#cells(texts) };
    const hint = separator === ',' ? ' (a decimal comma needs another separator, or quotes are missing)' : '';
    const detail = `Line ${line} has ${filled} cells under ${width} headings${hint}.`;
    return { line, bytes, serial, measuredAt, misfit: malformed(detail), cells: {} };
  }

  #texts(texts: readonly string[]) {
    const { positions } = this.#header;
    return { serial: texts[positions.serial!], measuredAt: texts[positions.measuredAt!] };
  }

  #cells(texts: readonly string[]): CsvRow['cells'] {
    const cells: Partial<Record<ColumnName, Cell>> = {};
    for (const column of this.#header.measured) {
      const text = texts[this.#header.positions[column.name]!] ?? '';
      if (text !== '' || column.name === 'current' || column.name === 'inductance') {
        cells[column.name] = { text, ...this.#value(column, text) };
      }
    }
    return cells;
  }

  #value({ name, power, kelvin }: Column, text: string): { value: string | number } | { reason: string } {
    if (name === 'rig') return { value: text };
    if (name === 'kind') return kindOf(text);
    const read: Decimal = kelvin ? celsiusOfKelvin(text) : decimal(text, power);
    if ('reason' in read) return read;
    if (read.mark !== '' && this.#mark !== '' && read.mark !== this.#mark) return { reason: this.#otherMark(text) };
    this.#mark ||= read.mark;
    return { value: read.value };
  }

  #otherMark(text: string): string {
    return this.#header.separator === ','
      ? `${quoted(text)} has a decimal comma, which needs semicolons or tabs between the cells`
      : `${quoted(text)} has the decimal mark that the numbers before it do not have`;
  }
}

const malformed = (detail: string): NonNullable<CsvRow['misfit']> => ({ code: 'malformed-request', detail });

function kindOf(text: string): { value: string } | { reason: string } {
  const kind = text.toLowerCase();
  if (kind === 'differential' || kind === 'apparent') return { value: kind };
  return { reason: `${quoted(text)} is neither differential nor apparent` };
}
