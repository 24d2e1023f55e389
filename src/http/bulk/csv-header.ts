import { CoilproofError, type FieldError } from '../../errors.ts';
import { pointerOf } from '../schema-issues.ts';
import { summary } from './bulk-line.ts';
import { csvCells, isUnclosedQuote, quoteMistake } from './csv-cells.ts';
import { type Column, type ColumnName, columnOf, type SweepKind } from './csv-columns.ts';
import { quoted } from './decimal.ts';

export interface CsvHeader {
  readonly separator: string;
  /** how many cells of a row stand under a heading; what follows must be empty */
  readonly width: number;
  /** where each column stands in a row */
  readonly positions: Readonly<Partial<Record<ColumnName, number>>>;
  readonly columns: Readonly<Partial<Record<ColumnName, Column>>>;
  /** those columns that do not say which unit a row is of */
  readonly measured: readonly Column[];
  /** of every unit, where no `kind` column says it */
  readonly kind: SweepKind;
}

const SEPARATORS = [',', ';', '\t'];
const REQUIRED = {
  serial: 'serial',
  measuredAt: 'measured at',
  rig: 'rig',
  current: 'current [A]',
  inductance: 'inductance [µH]',
};
/** Errors that are spelt out; the rest is counted. */
const MAXIMUM_ERRORS = 20;
const MAXIMUM_LINES = 100;
const MAXIMUM_COLUMNS = 200;

/**
 * Reads the header of a CSV body, line by line since a quoted heading may go over several. The separator is the one by which the most
 * headings are known; a first line `sep=;`, as spreadsheets understand it, says it instead. Throws a `CoilproofError` for the
 * whole body, its fields naming the headings: `invalid-body` for columns unknown, without unit, missing or given twice,
 * `malformed-request` for what is no CSV.
 */
export class CsvHeaderReader {
  #text = '';
  #lines = 0;
  #separators: readonly string[] = SEPARATORS;

  /** Takes the next line; answers with the header once it is complete. */
  add(line: string): CsvHeader | undefined {
    if (line.includes('\r')) throw new CoilproofError('malformed-request', 'The lines end in CR; LF or CR LF is read.');
    const [, announced] = (this.#lines === 0 && /^"?sep=([,;\t])"?$/i.exec(line.trimEnd())) || [];
    if (announced !== undefined && this.#separators.length > 1) {
      this.#separators = [announced];
      return undefined;
    }
    this.#text += this.#lines++ === 0 ? line : `\n${line}`;
    const splits = this.#separators.map((separator) => split(this.#text, separator));
    const best = splits
      .filter((found) => 'cells' in found)
      .sort((a, b) => b.known - a.known || b.cells.length - a.cells.length)[0];
    if (best) return headerOf(best.cells, best.separator);
    const errors = splits.flatMap((found) => ('error' in found ? [found.error] : []));
    const unclosed = errors.find(isUnclosedQuote);
    if (unclosed && this.#lines < MAXIMUM_LINES) return undefined;
    throw new CoilproofError('malformed-request', `The header cannot be read: ${quoteMistake(unclosed ?? errors[0])}.`);
  }

  /** The body has ended before its header has. */
  end(): never {
    const detail =
      this.#lines === 0
        ? 'The body is empty; its first line names the columns.'
        : 'The header cannot be read: a quoted cell is not closed.';
    throw new CoilproofError('malformed-request', detail);
  }
}

type Split =
  | { readonly separator: string; readonly cells: readonly string[]; readonly known: number }
  | { readonly error: unknown };

function split(text: string, separator: string): Split {
  try {
    const cells = csvCells(text, separator);
    return {
      separator,
      cells,
      known: cells.slice(0, MAXIMUM_COLUMNS).filter((cell) => typeof columnOf(cell) !== 'string').length,
    };
  } catch (error) {
    return { error };
  }
}

function headerOf(cells: readonly string[], separator: string): CsvHeader {
  const width = cells.findLastIndex((cell) => cell !== '') + 1;
  if (width > MAXIMUM_COLUMNS) throw new CoilproofError('malformed-request', `The header has ${width} columns.`);
  const errors: FieldError[] = [];
  const refuse = (heading: string, detail: string) => errors.push({ pointer: pointerOf([heading]), detail });
  const positions: Partial<Record<ColumnName, number>> = {};
  const columns: Partial<Record<ColumnName, Column>> = {};
  for (const [position, cell] of cells.slice(0, width).entries()) {
    const column = cell === '' ? `column ${position + 1} has no heading` : columnOf(cell);
    if (typeof column === 'string') {
      refuse(cell, column);
      continue;
    }
    const earlier = columns[column.name];
    if (earlier) refuse(cell, `${quoted(column.heading)} and ${quoted(earlier.heading)} are the same column twice`);
    positions[column.name] = position;
    columns[column.name] = column;
  }
  for (const [name, heading] of Object.entries(REQUIRED)) {
    const named = columns[name as ColumnName] || cells.some((cell) => isMeant(cell, heading));
    if (!named) refuse(heading, `a column like ${quoted(heading)} is missing`);
  }
  const said = columns.inductance?.kind;
  if (said && columns.kind) {
    refuse(columns.kind.heading, `${quoted(columns.inductance!.heading)} says the kind already`);
  }
  if (errors.length > 0) {
    throw new CoilproofError(
      'invalid-body',
      `The header does not fit: ${summary(errors)}.`,
      errors.slice(0, MAXIMUM_ERRORS),
    );
  }
  const measured = Object.values(columns).filter(({ name }) => name !== 'serial' && name !== 'measuredAt');
  return { separator, width, positions, columns, measured, kind: said ?? 'differential' };
}

/** Whether a heading that was refused already was an attempt at this one: then its absence is not said as well. */
const isMeant = (cell: string, heading: string): boolean =>
  cell.toLowerCase().includes(heading.replace(/ \[.*/, '').toLowerCase());
