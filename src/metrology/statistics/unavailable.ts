/** A statistic that these data cannot give, and why. */
export interface Unavailable {
  readonly unavailable: string;
}

export function isUnavailable(result: unknown): result is Unavailable {
  return typeof result === 'object' && result !== null && 'unavailable' in result;
}
