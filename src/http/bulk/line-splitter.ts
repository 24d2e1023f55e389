import { isUtf8 } from 'node:buffer';
import { CoilproofError } from '../../errors.ts';
import type { BulkProblem } from './bulk-line.ts';

export type TextLine = { readonly line: number; readonly text: string; readonly bytes: number } | BulkProblem;

const NEWLINE = 0x0a;
const CARRIAGE_RETURN = 0x0d;
/** Bytes that are held beside a line's own until it ends: a byte order mark before it, a CR after. */
const NOT_OF_THE_LINE = 4;
const NOTHING = Buffer.alloc(0);

/**
 * Cuts chunks of bytes into lines of text. A line ends with LF or CR LF, the last one also without; blank lines are counted and left
 * out, a byte order mark at the start is dropped. A line that is not UTF-8 is a problem on that line; so is one longer than
 * `longest` bytes, of which nothing more is kept.
 *
 * Bytes are cut before they are decoded (no UTF-8 sequence holds an LF), so that chunks may end inside a character. What a chunk
 * leaves of an unfinished line is copied into one growing buffer: a list of the chunks' ends would keep each whole chunk alive.
 */
export class LineSplitter {
  readonly #longest: number;
  #line = 1;
  #held: Buffer = NOTHING;
  #heldBytes = 0;
  #overlong = false;

  constructor(longest: number) {
    this.#longest = longest;
  }

  /** The lines that end in this chunk, each made as it is taken; take them all before the next chunk. */
  *split(chunk: Buffer): Generator<TextLine> {
    let start = 0;
    for (let end = chunk.indexOf(NEWLINE); end !== -1; end = chunk.indexOf(NEWLINE, start)) {
      const rest = chunk.subarray(start, end);
      start = end + 1;
      const line = this.#finish(rest);
      if (line) yield line;
    }
    this.#hold(chunk.subarray(start));
  }

  /** The line that the body ended in. */
  *end(): Generator<TextLine> {
    const line = this.#finish(NOTHING);
    if (line) yield line;
  }

  #hold(bytes: Buffer): void {
    const needed = this.#heldBytes + bytes.length;
    if (this.#overlong || needed > this.#longest + NOT_OF_THE_LINE) {
      this.#overlong = true;
      this.#heldBytes = 0;
      return;
    }
    if (needed > this.#held.length) {
      const grown = Buffer.allocUnsafeSlow(
        Math.max(needed, Math.min(2 * this.#held.length, this.#longest + NOT_OF_THE_LINE)),
      );
      this.#held.copy(grown, 0, 0, this.#heldBytes);
      this.#held = grown;
    }
    bytes.copy(this.#held, this.#heldBytes);
    this.#heldBytes = needed;
  }

  #finish(rest: Buffer): TextLine | undefined {
    const line = this.#line++;
    let bytes = rest;
    if (this.#overlong || this.#heldBytes > 0) {
      this.#hold(rest);
      bytes = this.#held.subarray(0, this.#heldBytes);
    }
    const overlong = this.#overlong;
    this.#heldBytes = 0;
    this.#overlong = false;
    if (overlong) return this.#tooLong(line);
    if (line === 1) {
      if (isUtf16(bytes)) return problem(line, 'malformed-request', 'The body is UTF-16; it is read as UTF-8 alone.');
      bytes = withoutByteOrderMark(bytes);
    }
    if (bytes.at(-1) === CARRIAGE_RETURN) bytes = bytes.subarray(0, -1);
    if (bytes.length > this.#longest) return this.#tooLong(line);
    if (!isUtf8(bytes)) return problem(line, 'malformed-request', `Line ${line} is not valid UTF-8.`);
    const text = bytes.toString('utf8');
    return text.trim() === '' ? undefined : { line, text, bytes: bytes.length };
  }

  #tooLong(line: number): BulkProblem {
    return problem(line, 'too-large', `Line ${line} is longer than ${this.#longest} bytes.`);
  }
}

const problem = (line: number, code: 'malformed-request' | 'too-large', detail: string): BulkProblem => ({
  line,
  problem: new CoilproofError(code, detail),
  bytes: 0,
});

const isUtf16 = ([first, second]: Buffer): boolean =>
  (first === 0xff && second === 0xfe) || (first === 0xfe && second === 0xff);

const withoutByteOrderMark = (bytes: Buffer): Buffer =>
  bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf ? bytes.subarray(3) : bytes;
