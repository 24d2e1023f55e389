import { quoted } from './decimal.ts';

export type ColumnName =
  | 'serial'
  | 'measuredAt'
  | 'rig'
  | 'kind'
  | 'current'
  | 'inductance'
  | 'temperature'
  | 'resistance';

export type SweepKind = 'differential' | 'apparent';

/** What a heading says of the cells under it. */
export interface Column {
  readonly name: ColumnName;
  /** as the header has it */
  readonly heading: string;
  /** cells are read times ten to this power; of texts 0 */
  readonly power: number;
  readonly kelvin: boolean;
  /** where the heading says what an inductance is */
  readonly kind?: SweepKind;
}

interface Known {
  readonly name: ColumnName;
  readonly quantity?: 'current' | 'inductance' | 'resistance' | 'temperature';
  readonly kind?: SweepKind;
}

/** By the label in lower case without spaces, hyphens and underscores. */
const KNOWN: ReadonlyMap<string, Known> = new Map<string, Known>([
  ['serial', { name: 'serial' }],
  ['measuredat', { name: 'measuredAt' }],
  ['rig', { name: 'rig' }],
  ['kind', { name: 'kind' }],
  ['current', { name: 'current', quantity: 'current' }],
  ['inductance', { name: 'inductance', quantity: 'inductance' }],
  ['differentialinductance', { name: 'inductance', quantity: 'inductance', kind: 'differential' }],
  ['apparentinductance', { name: 'inductance', quantity: 'inductance', kind: 'apparent' }],
  ['temperature', { name: 'temperature', quantity: 'temperature' }],
  ['resistance', { name: 'resistance', quantity: 'resistance' }],
]);

const ACCEPTED = {
  current: 'A, mA, µA, nA or kA',
  inductance: 'H, mH, µH, nH or pH',
  resistance: 'Ω, mΩ, µΩ, nΩ or kΩ (or ohm)',
  temperature: '°C, degC or K',
};
const BASE = { current: /^a$/i, inductance: /^h$/i, resistance: /^(ω|ohms?)$/i };

/** In the case of either letter where it can mean one thing only; a capital M is mega, and seldom meant. */
const PREFIX: Readonly<Record<string, number>> = { p: -12, n: -9, N: -9, μ: -6, u: -6, U: -6, m: -3, k: 3, K: 3 };

/**
 * What a heading means: a label and, in square brackets, the unit, as `inductance [µH]`. The case of the label and spaces do not
 * matter. Compatibility forms count as what they look like (NFKC): the micro sign and the Greek mu, the ohm sign and the Greek omega,
 * the single character ℃, the no-break space. A string: what is wrong with it.
 */
export function columnOf(text: string): Column | string {
  const heading = text.replaceAll(/\s+/g, ' ').trim();
  const [, label = '', unit] =
    /^([^[\]]*)(?:\[([^[\]]*)\])?$/.exec(heading.replaceAll('º', '°').normalize('NFKC')) ?? [];
  const known = KNOWN.get(label.toLowerCase().replaceAll(/[\s_-]/g, ''));
  if (!known) return `${quoted(heading)} is not a column that is read here`;
  const { name, quantity, kind } = known;
  const column = { name, heading, power: 0, kelvin: false };
  if (!quantity) return unit === undefined ? column : `${quoted(heading)} has a unit, and is a text`;
  if (unit === undefined) return `${quoted(heading)} needs its unit in square brackets: ${ACCEPTED[quantity]}`;
  const scale = scaleOf(unit.replaceAll(/\s/g, ''), quantity);
  if (!scale) return `the unit of ${quoted(heading)} is not one of ${ACCEPTED[quantity]}`;
  return { ...column, ...scale, ...(kind && { kind }) };
}

function scaleOf(unit: string, quantity: NonNullable<Known['quantity']>) {
  if (quantity === 'temperature') {
    if (/^(°|deg)c$/i.test(unit)) return { power: 0, kelvin: false };
    return /^k$/i.test(unit) ? { power: 0, kelvin: true } : undefined;
  }
  if (BASE[quantity].test(unit)) return { power: 0, kelvin: false };
  const power = PREFIX[unit.charAt(0)];
  return power !== undefined && BASE[quantity].test(unit.slice(1)) ? { power, kelvin: false } : undefined;
}
