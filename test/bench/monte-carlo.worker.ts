/** One thread of monte-carlo.bench.ts: runs the blocks it is sent and hands back their samples. */
import { parentPort } from 'node:worker_threads';
import { recordModel } from '../../src/metrology/monte-carlo.ts';
import { type Block, runBlock } from '../../src/metrology/trials.ts';
import { energy } from '../../src/physics/calculations/energy.ts';
import { currentSheetInductance_H } from '../../src/physics/coils/nagaoka.ts';
import type { Solenoid } from '../../src/physics/coils/solenoid.ts';

export interface Task {
  /**
   * `formula`: ½·L·I² alone, as numpy computes it; `calculation`: the service's energy calculation, with all it
   * answers.
   */
  readonly route: 'formula' | 'calculation';
  readonly coil: Solenoid;
  readonly current_A: number;
  readonly uncertainty: { readonly diameter_m: number; readonly length_m: number; readonly current_A: number };
  readonly blocks: readonly Block[];
}

interface Energised {
  readonly coil: Solenoid;
  readonly current_A: number;
}

function energy_J({ coil: { turns, diameter_m, length_m }, current_A }: Energised) {
  return { energy_J: 0.5 * currentSheetInductance_H(turns, diameter_m, length_m) * current_A * current_A };
}

function modelOf({ route, coil, current_A, uncertainty: u }: Task) {
  if (route === 'formula') {
    const uncertainty = {
      '/coil/diameter_m': u.diameter_m,
      '/coil/length_m': u.length_m,
      '/current_A': u.current_A,
    };
    return recordModel({ coil, current_A }, uncertainty, energy_J);
  }
  const request = { inductor: { coil }, current_A };
  const uncertainty = {
    '/inductor/coil/diameter_m': u.diameter_m,
    '/inductor/coil/length_m': u.length_m,
    '/current_A': u.current_A,
  };
  const outputNames = Object.keys(energy.mainOutputs(energy.calculate(request)));
  return recordModel(request, uncertainty, energy.calculate, undefined, outputNames);
}

parentPort!.on('message', (task: Task) => {
  const { model, inputs, outputNames } = modelOf(task);
  const blocks = task.blocks.map((block) => runBlock(model, inputs, outputNames.length, block));
  parentPort!.postMessage(
    { outputNames, blocks },
    blocks.map(({ buffer }) => buffer as ArrayBuffer),
  );
});
