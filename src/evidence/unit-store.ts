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

/** Units of a lot by outcome, and how many of them a rig out of calibration measured. */
export type UnitCounts = Readonly<Record<Outcome, number>> & { readonly outOfCalibration: number };

/** Some units of one lot, and how they roll up. */
export interface UnitBatch {
  readonly lot: string;
  readonly entries: readonly UnitEntry[];
  /** asked for those of the units that are new */
  readonly rollUp: (added: readonly JudgedUnit[]) => readonly RollupPart[];
}

/** The port through which measured units are recorded and read. (lot, serial, measuredAt) is the key. */
export interface UnitStore {
  /**
   * Records batches in their order, all in one transaction: durable when the promise resolves. Counts and rollups are brought up to
   * date in the same transaction, each new unit once. Answers as many recordings for each batch as it has entries.
   */
  record(batches: readonly UnitBatch[]): Promise<Recording[][]>;
  list(lot: string, filter: UnitFilter): Promise<RecordedUnit[]>;
  /** The units recorded last, the latest first. */
  last(lot: string, limit: number): Promise<RecordedUnit[]>;
  /** The last recorded measurement of a serial. */
  ofSerial(lot: string, serial: string): Promise<RecordedUnit | undefined>;
  /** Position of the lot's last recorded unit; 0 where there is none. */
  lastPosition(lot: string): Promise<number>;
  counts(lot: string): Promise<UnitCounts>;
  /** Every rollup of the lots. */
  rollups(lots: readonly string[]): Promise<Rollup[]>;
}
