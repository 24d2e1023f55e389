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

/** Runs `calculate`; an `InvalidQuantity` it throws comes out with `prefix` (such as `/coil`) before its pointer. */
export function within<T>(prefix: string, calculate: () => T): T {
  try {
    return calculate();
  } catch (error) {
    if (error instanceof InvalidQuantity) throw new InvalidQuantity(prefix + error.pointer, error.detail);
    throw error;
  }
}
