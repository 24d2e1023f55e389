export type Decimal = { readonly value: number; readonly mark: '.' | ',' | '' } | { readonly reason: string };

const DECIMAL = /^([+-]?)(\d*)([.,]?)(\d*)(?:e([+-]?\d{1,4}))?$/i;
/** More is no reading, and long integers take quadratic time. */
const LONGEST = 100;
const GROUPED = /^[+-]?\d{1,3}(?:[.,'’\s]\d{3})+(?:[.,]\d*)?$/;

/**
 * A number as spreadsheets and instruments write it, times a power of ten: `47.5` with −6 is 4.75e-5. The power is added to the
 * exponent before the text becomes a float, so that the value is the float nearest to what was written, as `47.5e-6` in JSON is.
 */
export function decimal(text: string, power: number): Decimal {
  const parts = partsOf(text);
  if (!parts) return { reason: mistake(text) };
  const { sign, whole, mark, fraction, exponent } = parts;
  const value = Number(`${sign}${whole || '0'}.${fraction || '0'}e${exponent + power}`);
  return Number.isFinite(value) ? { value, mark } : { reason: `${quoted(text)} is out of range` };
}

/** Kelvin to °C by decimal subtraction, so that 298.15 K is 25 °C and not its neighbour. */
export function celsiusOfKelvin(text: string): Decimal {
  const parts = partsOf(text);
  if (!parts) return { reason: mistake(text) };
  const { sign, whole, mark, fraction, exponent } = parts;
  const places = fraction.length - exponent;
  if (places < -10 || places > 1000) return { reason: `${quoted(text)} is out of range` };
  const common = Math.max(places, 2);
  const kelvin = BigInt(`${whole}${fraction}`) * 10n ** BigInt(common - places);
  const celsius = (sign === '-' ? -kelvin : kelvin) - 27315n * 10n ** BigInt(common - 2);
  return { value: Number(`${celsius}e-${common}`), mark };
}

function partsOf(text: string) {
  if (text.length > LONGEST) return undefined;
  const match = DECIMAL.exec(text.replace('\u2212', '-')); // the minus sign that typeset locales write
  if (!match) return undefined;
  const [, sign = '', whole = '', mark = '', fraction = '', exponent = '0'] = match;
  if (whole === '' && fraction === '') return undefined;
  return { sign, whole, mark: mark as '.' | ',' | '', fraction, exponent: Number(exponent) };
}

function mistake(text: string): string {
  if (text === '') return 'empty';
  if (GROUPED.test(text)) return `${quoted(text)} has thousands separators, which are not read`;
  return `${quoted(text)} is not a number`;
}

/** Text from the body, short enough for a message. */
export const quoted = (text: string): string => JSON.stringify(text.length > 60 ? `${text.slice(0, 60)}…` : text);
