/**
 * Inductance of thick coils of every proportion, in milliseconds and as a ratio to one evaluation of Maxwell's filaments in the same
 * run: what a coil costs in pairs of filaments. Best of several repetitions, after warming up.
 *
 * node test/bench/multilayer.bench.ts
 */
import { coaxialLoopsMutualInductance_H } from '../../src/physics/coils/coaxial-loops.ts';
import { multilayerInductance } from '../../src/physics/coils/multilayer.ts';

const REPETITIONS = 40;
let sink = 0;

function milliseconds(calls: number, calculate: () => number): number {
  let best = Infinity;
  for (let i = 0; i < REPETITIONS; i++) {
    const start = performance.now();
    for (let call = 0; call < calls; call++) sink += calculate();
    best = Math.min(best, (performance.now() - start) / calls);
  }
  return best;
}

let distance = 0;
const filaments = milliseconds(2000, () => {
  distance = (distance + 1e-4) % 1;
  return coaxialLoopsMutualInductance_H(1, 1.1, distance + 0.01);
});
process.stdout.write(
  `one pair of filaments ${(filaments * 1e6).toFixed(0)} ns\n\nbuild/radius  length/radius        ms  ratio\n`,
);
for (const build of [1, 0.9, 0.5, 0.1, 1e-3, 1e-6]) {
  for (const length of [1e-6, 1e-3, 0.1, 1, 10, 1e3, 1e6]) {
    const coil = {
      shape: 'multilayer',
      turns: 1,
      innerDiameter_m: 2 * (1 - build),
      outerDiameter_m: 2,
      length_m: length,
    } as const;
    const each = milliseconds(1, () => multilayerInductance(coil).inductance_H);
    process.stdout.write(
      `${build.toExponential(0).padStart(12)}  ${length.toExponential(0).padStart(13)}  ${each.toFixed(3).padStart(8)}  ${(each / filaments).toFixed(0).padStart(5)}\n`,
    );
  }
}
if (!Number.isFinite(sink)) throw new Error('an inductance is not finite');
