import { analysePulse, type Pulse, type PulseAnalysis } from '../evidence/pulse.ts';
import { type Evaluate, recordModel } from '../metrology/monte-carlo.ts';
import { runBlock } from '../metrology/trials.ts';
import type { Calculation } from '../physics/calculations/calculation.ts';
import { calculationOf, exclusiveMinimum } from '../physics/calculations/index.ts';
import { InvalidQuantity, within } from '../physics/invalid-quantity.ts';
import type { Answered, SimulationShare, SimulationTask } from './compute.ts';

/** Some blocks of trials of a calculation. */
export const simulate = ({ calculation, request, uncertainty, blocks }: SimulationTask): Answered<SimulationShare> =>
  answered(() => {
    const { model, inputs, outputNames } = modelOf(calculationOf(calculation), request, uncertainty);
    const samples = within('/uncertainty', () =>
      blocks.map((block) => runBlock(model, inputs, outputNames.length, block)),
    );
    return { outputNames, samples };
  });

/** The analysis of one pulse. */
export const pulse = (samples: Pulse): Answered<PulseAnalysis> => answered(() => analysePulse(samples));

function answered<T>(work: () => T): Answered<T> {
  try {
    return { result: work() };
  } catch (error) {
    if (error instanceof InvalidQuantity) return { refused: { pointer: error.pointer, detail: error.detail } };
    throw error;
  }
}

/**
 * The model of a calculation's main outputs. Where they are plain fields of the answer, as most are, they are read from it as it
 * is: gathering them anew in each of a million trials would cost more than many a calculation.
 */
function modelOf(
  { calculate, mainOutputs }: Calculation<object, object>,
  request: object,
  uncertainty: Readonly<Record<string, number>>,
) {
  const answer = calculate(request) as Readonly<Record<string, unknown>>;
  const names = Object.keys(mainOutputs(answer));
  if (names.every((name) => typeof answer[name] === 'number')) {
    return recordModel(request, uncertainty, calculate as Evaluate<object>, exclusiveMinimum, names);
  }
  return recordModel(request, uncertainty, (record) => mainOutputs(calculate(record)), exclusiveMinimum);
}
