/**
 * A quantity that cannot exist or that a model cannot take. `pointer` is an RFC 6901 pointer relative to the record that the
 * throwing function was given, so that whoever holds the outer record can prefix it (see `within`).
 */
export class InvalidQuantity extends Error {
  readonly pointer: string;
  readonly detail: string;

  constructor(pointer: string, detail: string) {
    super(`${pointer}: ${detail}`);
    this.name = 'InvalidQuantity';
    this.pointer = pointer;
    this.detail = detail;
  }
}

/**
 * Runs `calculate`; an `InvalidQuantity` it throws comes out with `prefix` (such as `/coil`) before its pointer. A quantity that does
 * not lie below the prefix in the outer record, as a temperature beside a winding, is named in `elsewhere` with where it does.
 */
export function within<T>(prefix: string, calculate: () => T, elsewhere: Readonly<Record<string, string>> = {}): T {
  try {
    return calculate();
  } catch (error) {
    if (!(error instanceof InvalidQuantity)) throw error;
    throw new InvalidQuantity(elsewhere[error.pointer] ?? prefix + error.pointer, error.detail);
  }
}
