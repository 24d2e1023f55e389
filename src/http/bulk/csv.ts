import { bodyChunks } from './body-chunks.ts';
import { BULK_LIMITS, type BulkLimits, type BulkLine } from './bulk-line.ts';
import { type CsvHeader, CsvHeaderReader } from './csv-header.ts';
import { CsvRowReader } from './csv-row.ts';
import { CsvUnit } from './csv-unit.ts';
import { LineSplitter, type TextLine } from './line-splitter.ts';

/**
 * Units from CSV with one reading a row, as plain objects of the form that a unit has in JSON, in order, each as soon as the next one
 * starts. The rows of a unit follow each other and have the same serial and time of measurement; the columns are those of
 * `columnOf`. What cannot be read is a problem of its unit, and the rest goes on.
 *
 * A row ends with its line: no column holds line breaks, and so a quote that was forgotten spoils one row instead of all that
 * follow. A row that cannot be read, or does not say whose it is, may be of the unit before it or of the one after; these are
 * answered as problems with it, since a sweep that lacks a reading would be stored as if it were whole.
 *
 * Keeps one unit (up to `limits.readings`) and one chunk of the body. Throws a `CoilproofError` for the whole body where the header
 * does not fit (see `CsvHeaderReader`), and what reading the body throws.
 */
export async function* csvUnits(
  source: AsyncIterable<Uint8Array>,
  limits: BulkLimits = BULK_LIMITS,
): AsyncGenerator<BulkLine> {
  const lines = new LineSplitter(limits.lineBytes);
  const units = new UnitReader(limits);
  for await (const chunk of bodyChunks(source)) {
    for (const line of lines.split(chunk)) {
      const unit = units.add(line);
      if (unit) yield unit;
    }
  }
  for (const line of lines.end()) {
    const unit = units.add(line);
    if (unit) yield unit;
  }
  const last = units.end();
  if (last) yield last;
}

class UnitReader {
  readonly #limits: BulkLimits;
  readonly #headerReader = new CsvHeaderReader();
  #header: CsvHeader | undefined;
  #rows: CsvRowReader | undefined;
  #unit: CsvUnit | undefined;

  constructor(limits: BulkLimits) {
    this.#limits = limits;
  }

  /** Takes a line; answers with the unit that it shows to be complete. */
  add(line: TextLine): BulkLine | undefined {
    if (!this.#header || !this.#rows) {
      this.#readHeader(line);
      return undefined;
    }
    const row = this.#rows.read(line);
    if (!row) return undefined;
    const before = this.#unit;
    if (before?.takes(row)) {
      before.add(row);
      return undefined;
    }
    this.#unit = new CsvUnit(row, this.#header, this.#limits.readings);
    if (row.misfit) before?.doubt(row.line);
    if (before?.isDoubtful) this.#unit.doubt(before.line);
    return before?.finish();
  }

  end(): BulkLine | undefined {
    if (!this.#header) this.#headerReader.end();
    return this.#unit?.finish();
  }

  #readHeader(line: TextLine): void {
    if ('problem' in line) throw line.problem;
    this.#header = this.#headerReader.add(line.text);
    if (this.#header) this.#rows = new CsvRowReader(this.#header);
  }
}
