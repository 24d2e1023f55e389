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

function modelOf({ route, coil, current_A, uncertainty: u }: Task) {
  if (route === 'formula') {
    return recordModel(
      { coil, current_A },
      { '/coil/diameter_m': u.diameter_m, '/coil/length_m': u.length_m, '/current_A': u.current_A },
      ({ coil: { turns, diameter_m, length_m }, current_A }) => ({
        energy_J: 0.5 * currentSheetInductance_H(turns, diameter_m, length_m) * current_A * current_A,
      }),
    );
  }
  return recordModel(
    { inductor: { coil }, current_A },
    {
      '/inductor/coil/diameter_m': u.diameter_m,
      '/inductor/coil/length_m': u.length_m,
      '/current_A': u.current_A,
    },
    energy.calculate,
    undefined,
    Object.keys(energy.mainOutputs(energy.calculate({ inductor: { coil }, current_A }))),
  );
}

parentPort!.on('message', (task: Task) => {
  const { model, inputs, outputNames } = modelOf(task);
  const blocks = task.blocks.map((block) => runBlock(model, inputs, outputNames.length, block));
  parentPort!.postMessage(
    { outputNames, blocks },
    blocks.map(({ buffer }) => buffer as ArrayBuffer),
  );
});
