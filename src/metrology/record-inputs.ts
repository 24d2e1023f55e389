/** Numbers of a JSON record, reached by RFC 6901 pointers, as the inputs of a model. */
import { InvalidQuantity } from '../physics/invalid-quantity.ts';

/** An uncertain number that a model takes. */
export interface Input {
  /** What an answer calls it by; over a record, its pointer. */
  readonly name: string;
  readonly value: number;
  readonly standardUncertainty: number;
  /**
   * The input must lie above it, as a length above 0: a step or a draw beyond leaves the model's domain. Default: no
   * bound.
   */
  readonly exclusiveMinimum?: number | undefined;
}

/** The `exclusiveMinimum` of the input at a pointer, for models that do not themselves refuse what is beyond. */
export type ExclusiveMinimum = (pointer: string) => number | undefined;

/** Sets numbers to the values from place `first` (default 0) on. */
export type Setter = (values: ArrayLike<number>, first?: number) => void;

export interface BoundRecord<R> {
  /** A copy of the record, always the same object, holding the values last set. */
  readonly record: R;
  readonly inputs: readonly Input[];
  /** Sets every input, in the order of `inputs`. */
  readonly set: Setter;
}

/**
 * Copies `record` and finds in the copy every number that `uncertainty` (pointer to standard uncertainty) names. Throws
 * `InvalidQuantity` '/<escaped pointer>' where a pointer does not lead to a number or its uncertainty is negative.
 */
export function bindInputs<R extends object>(
  record: R,
  uncertainty: Readonly<Record<string, number>>,
  exclusiveMinimum: ExclusiveMinimum = () => undefined,
): BoundRecord<R> {
  const copy = structuredClone(record);
  const bound = Object.entries(uncertainty).map(([pointer, standardUncertainty]) => {
    if (!(standardUncertainty >= 0 && standardUncertainty < Number.POSITIVE_INFINITY)) {
      throw new InvalidQuantity(
        `/${escapePointerToken(pointer)}`,
        'a standard uncertainty must be a finite number, zero or positive',
      );
    }
    return { standardUncertainty, pointer, ...resolve(copy, pointer) };
  });
  return {
    record: copy,
    inputs: bound.map(({ pointer, value, standardUncertainty }) => ({
      name: pointer,
      value,
      standardUncertainty,
      exclusiveMinimum: exclusiveMinimum(pointer),
    })),
    set: setterOf(
      bound.map(({ container }) => container),
      bound.map(({ key }) => key),
    ),
  };
}

/** `text` as one token of a JSON pointer, RFC 6901 section 3. */
export function escapePointerToken(text: string): string {
  return text.replaceAll('~', '~0').replaceAll('/', '~1');
}

type Container = Record<string | number, unknown>;
type Key = string | number;

/**
 * Stores values at `keys` of `containers`. A million trials store to the same few places: a line of its own for each
 * makes a trial of a coil's energy a seventh faster than a loop, whose one store has to serve objects and keys of every
 * kind.
 */
function setterOf(containers: readonly Container[], keys: readonly Key[]): Setter {
  const [a, b, c] = containers as [Container, Container, Container];
  const [keyA, keyB, keyC] = keys as [Key, Key, Key];
  switch (keys.length) {
    case 1:
      return (values, first = 0) => {
        a[keyA] = values[first]!;
      };
    case 2:
      return (values, first = 0) => {
        a[keyA] = values[first]!;
        b[keyB] = values[first + 1]!;
      };
    case 3:
      return (values, first = 0) => {
        a[keyA] = values[first]!;
        b[keyB] = values[first + 1]!;
        c[keyC] = values[first + 2]!;
      };
    default:
      return (values, first = 0) => {
        for (let i = 0; i < keys.length; i++) containers[i]![keys[i]!] = values[first + i]!;
      };
  }
}

function resolve(root: object, pointer: string): { container: Container; key: Key; value: number } {
  const tokens = pointer.split('/');
  // Only the empty pointer, which is the record itself, does not start with a slash.
  let container: unknown = tokens.shift() === '' ? root : undefined;
  const last = tokens.pop();
  for (const token of tokens) container = member(container, token);
  const value = last === undefined ? undefined : member(container, last);
  if (typeof value !== 'number') {
    throw new InvalidQuantity(`/${escapePointerToken(pointer)}`, 'does not lead to a number of the request');
  }
  return { container: container as Container, key: keyIn(container, last!)!, value };
}

function member(container: unknown, token: string): unknown {
  const key = keyIn(container, token);
  return key === undefined ? undefined : (container as Container)[key];
}

/**
 * The own property that `token` names, or undefined: an inherited one, such as `constructor`, is none of the record's.
 */
function keyIn(container: unknown, token: string): Key | undefined {
  if (Array.isArray(container)) return /^(0|[1-9]\d*)$/.test(token) ? Number(token) : undefined;
  if (typeof container !== 'object' || container === null || /~(?![01])/.test(token)) return undefined;
  const key = token.replaceAll('~1', '/').replaceAll('~0', '~');
  return Object.hasOwn(container, key) ? key : undefined;
}
