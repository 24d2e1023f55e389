import { z } from 'zod';

/** Text that people read: not empty, no control characters (which would forge lines in logs and tables). */
export const text = (longest: number) =>
  z
    .string()
    .min(1)
    .max(longest)
    .regex(/^[^\p{Cc}]*$/u, 'must not hold control characters');

/** An id that a caller chooses: what reads well in a URL and a log. */
export const identifier = z
  .string()
  .min(1)
  .max(100)
  .regex(/^[A-Za-z0-9][A-Za-z0-9._-]*$/, 'letters, digits, dot, underscore and hyphen; a letter or digit first');
