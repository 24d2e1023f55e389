/**
 * How a number was obtained, in words that an engineer can check.
 * `relativeError` is an honest bound on the model's own error (what the formula neglects), not on rounding.
 */
export interface Method {
  readonly name: string;
  readonly references: readonly string[];
  readonly relativeError: number;
  readonly validity: string;
}
