/** Standard uncertainty of one kind of reading: a gain error relative to the reading, and an offset, independent of each other. */
export interface InductanceUncertainty {
  readonly relative?: number;
  readonly offset_H?: number;
}
export interface CurrentUncertainty {
  readonly relative?: number;
  readonly offset_A?: number;
}
export interface ResistanceUncertainty {
  readonly relative?: number;
  readonly offset_ohm?: number;
}
export interface VoltageUncertainty {
  readonly relative?: number;
  readonly offset_V?: number;
}

/**
 * What an instrument cannot know, as standard uncertainties (k = 1). Gain and offset are taken as common to every reading of a
 * sweep: one instrument reads them all, so averaging over the readings does not make either smaller.
 */
export interface Instrument {
  readonly inductance?: InductanceUncertainty;
  readonly current?: CurrentUncertainty;
  readonly resistance?: ResistanceUncertainty;
  readonly voltage?: VoltageUncertainty;
}
