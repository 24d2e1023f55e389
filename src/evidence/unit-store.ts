import type { Outcome } from './judge.ts';
import type { JudgedUnit } from './judged-unit.ts';
import type { RollupPart } from './rollup.ts';
import type { Unit } from './unit.ts';

/** A unit to be recorded: as it was sent, its digest, and what it was judged to be. */
export interface UnitEntry {
  readonly unit: Unit;
  readonly digest: string;
  readonly judged: JudgedUnit;
}

/** What became of an entry. A repeat answers with what the first one was judged; a conflict is another content under the same key. */
export type Recording =
  | { readonly kind: 'recorded' | 'repeated'; readonly judged: JudgedUnit }
  | { readonly kind: 'conflict' };

export interface RecordedUnit {
  /** the unit's place in the order of recording */
  readonly position: number;
  readonly unit: Unit;
  readonly judged: JudgedUnit;
}

export interface UnitFilter {
  readonly outcome?: Outcome;
  readonly after?: number;
  readonly limit: number;
}

/** The statistics of one quantity over the units that one rig ('' : an inline instrument) measured of one lot on one day. */
export interface Rollup extends RollupPart {
  readonly lot: string;
}

export type OutcomeCounts = Readonly<Record<Outcome, number>>;

/** The port through which measured units are recorded and read. (lot, serial, measuredAt) is the key. */
export interface UnitStore {
  /**
   * Records entries of one lot in their order, all in one transaction: durable when the promise resolves. Counts and rollups are
   * brought up to date in the same transaction, by what `rollUp` makes of the units that are new.
   */
  record(
    lot: string,
    entries: readonly UnitEntry[],
    rollUp: (added: readonly JudgedUnit[]) => readonly RollupPart[],
  ): Promise<Recording[]>;
  list(lot: string, filter: UnitFilter): Promise<RecordedUnit[]>;
  counts(lot: string): Promise<OutcomeCounts>;
  /** Every rollup of the lots. */
  rollups(lots: readonly string[]): Promise<Rollup[]>;
}
