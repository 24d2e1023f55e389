import type { Lot } from '../evidence/lot.ts';
import type { Rig } from '../evidence/rig.ts';
import type { Material } from '../physics/core/material.ts';
import type { Part } from './part.ts';

/** What is registered, by kind. A part's id is `partId` of its number and revision. */
export interface RegistryKinds {
  readonly material: Material;
  readonly rig: Rig;
  readonly part: Part;
  readonly lot: Lot;
}

export type RegistryKind = keyof RegistryKinds;

export interface Registered<T> {
  readonly id: string;
  readonly value: T;
  /** digest of the value: the same content has the same tag */
  readonly tag: string;
}

/** What must hold of what is stored for a write to go ahead (RFC 9110, 13.1). */
export interface Precondition {
  /** tags of which one must be the stored one; `*`: something must be stored */
  readonly ifMatch?: readonly string[] | '*';
  /** `*`: nothing may be stored */
  readonly ifNoneMatch?: '*';
}

export interface RegistryPage {
  /** ids that start with this */
  readonly prefix?: string;
  readonly after?: string;
  readonly limit: number;
}

/** The port to what is registered: materials, rigs, released parts and lots. */
export interface Registry {
  get<K extends RegistryKind>(kind: K, id: string): Promise<Registered<RegistryKinds[K]> | undefined>;
  /**
   * Stores `value`. `mayReplace` is asked where another value is stored, inside the same transaction; it throws to refuse.
   * Throws `CoilproofError` `precondition-failed` where the precondition does not hold.
   */
  put<K extends RegistryKind>(
    kind: K,
    id: string,
    value: RegistryKinds[K],
    options: { readonly precondition: Precondition; readonly mayReplace: (stored: RegistryKinds[K]) => void },
  ): Promise<{ readonly registered: Registered<RegistryKinds[K]>; readonly created: boolean }>;
  list<K extends RegistryKind>(kind: K, page: RegistryPage): Promise<Registered<RegistryKinds[K]>[]>;
}

/** One text for number and revision that no other pair shares: a solidus cannot stand in either unescaped. */
export const partId = (number: string, revision: string): string =>
  `${encodeURIComponent(number)}/${encodeURIComponent(revision)}`;
