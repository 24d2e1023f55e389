import { recordModel } from '../metrology/monte-carlo.ts';
import { runBlock } from '../metrology/trials.ts';
import { calculationOf, exclusiveMinimum } from '../physics/calculations/index.ts';
import { InvalidQuantity } from '../physics/invalid-quantity.ts';
import type { SimulationShare, SimulationTask } from './simulation.ts';

/** What a compute thread does: some blocks of trials of a calculation. A refused quantity crosses to the caller as data. */
export default function run({ calculation, request, uncertainty, blocks }: SimulationTask): SimulationShare {
  const { calculate, mainOutputs } = calculationOf(calculation);
  try {
    const evaluate = (record: object) => mainOutputs(calculate(record));
    const { model, inputs, outputNames } = recordModel(request, uncertainty, evaluate, exclusiveMinimum);
    const samples = blocks.map((block) => runBlock(model, inputs, outputNames.length, block));
    return { outputNames, samples };
  } catch (error) {
    if (error instanceof InvalidQuantity) return { refused: { pointer: error.pointer, detail: error.detail } };
    throw error;
  }
}
