/**
 * A calculation as a service offers it: a pure function from a request record to an answer record, and which numbers of the
 * answer are its main outputs, so that uncertainty can be propagated to them without knowing what is calculated.
 */
export interface Calculation<Request, Answer> {
  /** Throws `InvalidQuantity`, its pointer relative to the request. */
  calculate(request: Request): Answer;
  mainOutputs(answer: Answer): Record<string, number>;
}

/** The numbers among `values`; a quantity that the request did not ask for, or that does not exist, is left out. */
export function numbersOf(values: Readonly<Record<string, number | null | undefined>>): Record<string, number> {
  return Object.fromEntries(
    Object.entries(values).filter((entry): entry is [string, number] => typeof entry[1] === 'number'),
  );
}
