const PREFIXES = [
  [1e12, 'T'],
  [1e9, 'G'],
  [1e6, 'M'],
  [1e3, 'k'],
  [1, ''],
  [1e-3, 'm'],
  [1e-6, 'µ'],
  [1e-9, 'n'],
  [1e-12, 'p'],
] as const;

/** Units that are read without an SI prefix. */
const UNPREFIXED = new Set(['°C', 'K', '1', '%']);

/** A quantity as an engineer writes it: four significant digits and an SI prefix, "48.25 µH". */
export function inWords(value: number, unit: string): string {
  if (value === 0 || UNPREFIXED.has(unit)) return `${digits(value)} ${unit === '1' ? '' : unit}`.trim();
  const magnitude = Math.abs(value);
  const [scale, prefix] = PREFIXES.find(([candidate]) => magnitude >= candidate * 0.99995) ?? [1e-12, 'p'];
  return `${digits(value / scale)} ${prefix}${unit}`;
}

/** Four significant digits; a power of ten only where the number is unwieldy without. */
function digits(value: number): string {
  if (value === 0) return '0';
  const magnitude = Math.abs(value);
  return magnitude >= 1e5 || magnitude < 1e-3 ? value.toExponential(3) : String(Number(value.toPrecision(4)));
}

/** A fraction as a percentage of two significant digits or a whole number: 0.0345 → "3.5 %". */
export function percent(fraction: number): string {
  const value = fraction * 100;
  return `${Math.abs(value) >= 10 ? Math.round(value) : Number(value.toPrecision(2))} %`;
}
