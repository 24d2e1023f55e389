import { CoilproofError } from '../errors.ts';
import { pointerOf } from './schema-issues.ts';

/**
 * Lets an answer through only where every number in it is finite. Schemas bound each input, but products of extremes can still
 * leave the range of 64-bit floats; JSON would turn that into null, which a caller could take for a value.
 */
export function assertFinite(answer: unknown, path: readonly PropertyKey[] = []): void {
  if (typeof answer === 'number') {
    if (!Number.isFinite(answer)) {
      throw new CoilproofError(
        'number-range',
        `The result at ${pointerOf(path)} over- or underflows for these inputs.`,
      );
    }
  } else if (Array.isArray(answer)) {
    for (const [index, value] of answer.entries()) assertFinite(value, [...path, index]);
  } else if (answer !== null && typeof answer === 'object') {
    for (const [key, value] of Object.entries(answer)) assertFinite(value, [...path, key]);
  }
}
