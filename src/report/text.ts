/** Text in figures. Widths are estimates, on the wide side: the reader's font isn't known where the figure is drawn. */

/** Mean width of a character over the font's size, as in the widest sans-serif fonts in use. */
const EM_PER_CHARACTER = { plain: 0.61, bold: 0.7 } as const;

/** East Asian scripts and symbols from there on fill the square. */
const FIRST_WIDE_CODE_POINT = 0x2e80;

export type Weight = keyof typeof EM_PER_CHARACTER;

export function widthOf(text: string, size: number, weight: Weight = 'plain'): number {
  let em = 0;
  for (const character of text) {
    em += character.codePointAt(0)! >= FIRST_WIDE_CODE_POINT ? 1 : EM_PER_CHARACTER[weight];
  }
  return em * size;
}

/** The text, or as much of its beginning as fits, with an ellipsis. */
export function fitted(text: string, width: number, size: number, weight: Weight = 'plain'): string {
  if (widthOf(text, size, weight) <= width) return text;
  const characters = [...text];
  while (characters.length > 1 && widthOf(`${characters.join('')}…`, size, weight) > width) characters.pop();
  return `${characters.join('').trimEnd()}…`;
}

/** As `fitted`, leaving out the middle: names of a series differ in their ends. */
export function fittedMiddle(text: string, width: number, size: number): string {
  if (widthOf(text, size) <= width) return text;
  const characters = [...text];
  const shortened = (kept: number) =>
    `${characters.slice(0, kept >> 1).join('')}…${characters.slice(-((kept + 1) >> 1)).join('')}`;
  let kept = characters.length - 1;
  while (kept > 1 && widthOf(shortened(kept), size) > width) kept--;
  return shortened(kept);
}

/** One line without what XML 1.0 forbids: control characters become spaces, lone surrogates and non-characters U+FFFD. */
export function oneLine(text: string): string {
  return (
    text
      .toWellFormed()
      // biome-ignore lint/suspicious/noControlCharactersInRegex: they are what is replaced
      .replace(/[\u0000-\u001f\u007f-\u009f\u2028\u2029]+/g, ' ')
      .replace(/[\ufffe\uffff]/g, '\ufffd')
  );
}

export function escaped(text: string): string {
  return oneLine(text).replace(/&/g, '&amp;').replace(/</g, '&lt;').replace(/>/g, '&gt;').replace(/"/g, '&quot;');
}

/** Hyphens before digits as minus signs. */
export const withMinus = (number: string): string => number.replace(/-(?=\d)/g, '−');
