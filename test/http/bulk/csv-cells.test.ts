import { parse } from 'csv-parse/sync';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { csvCells, isUnclosedQuote, quoteMistake } from '../../../src/http/bulk/csv-cells.ts';

const mistakeIn = (row: string) => {
  try {
    return { cells: csvCells(row, ';') };
  } catch (error) {
    return { mistake: quoteMistake(error), unclosed: isUnclosedQuote(error) };
  }
};

describe('the cells of a row', () => {
  it.each([
    ['a;b;c', ['a', 'b', 'c']],
    [' a ;; c;', ['a', '', 'c', '']],
    ['"a";"b";', ['a', 'b', '']],
    ['"a;b";c', ['a;b', 'c']],
    ['"say ""b""";c', ['say "b"', 'c']],
    ['"a" ; " b "', ['a', 'b']],
    ['"";"";""', ['', '', '']],
    ['"a\nb";c', ['a\nb', 'c']],
  ])('%j are %j', (row, cells) => {
    expect(csvCells(row, ';')).toEqual(cells);
  });

  it.each([
    ['a;"b', 'a quoted cell is not closed on its line', true],
    ['a;b"c', 'a quote inside a cell that is not quoted', false],
    ['"a"b;c', 'text between a closing quote and the separator', false],
  ])('%j cannot be read: %s', (row, mistake, unclosed) => {
    expect(mistakeIn(row)).toEqual({ mistake, unclosed });
  });

  it('are what the library alone makes of any row', () => {
    const piece = fc.string({ unit: fc.constantFrom('"', ';', 'a', ' ', 'µ', '""', '";"', ';"', '";'), maxLength: 12 });
    const byLibrary = (row: string) => {
      try {
        return parse(row, { delimiter: ';', record_delimiter: '\n', relax_column_count: true, trim: true })[0]!.map(
          (cell) => cell.trim(),
        );
      } catch {
        return 'refused';
      }
    };
    fc.assert(
      fc.property(piece, (row) => {
        if (row.trim() === '') return;
        const cells = mistakeIn(row).cells ?? 'refused';
        expect(cells).toEqual(byLibrary(row));
      }),
      { seed: 3, numRuns: 3000 },
    );
  });
});
