import type { FluxCharacteristic } from './characteristic.ts';
import type { Cored } from './characteristics/cored.ts';
import { coredCharacteristic } from './characteristics/cored.ts';
import { linearCharacteristic } from './characteristics/linear.ts';
import { type CoaxialLine, coaxialLineInductance } from './coils/coaxial-line.ts';
import { type FlatSpiral, flatSpiralInductance } from './coils/flat-spiral.ts';
import { type Multilayer, multilayerInductance } from './coils/multilayer.ts';
import { type ParallelWires, parallelWiresInductance } from './coils/parallel-wires.ts';
import { type RectangularLoop, rectangularLoopInductance } from './coils/rectangular-loop.ts';
import { type RoundLoop, roundLoopInductance } from './coils/round-loop.ts';
import { type Solenoid, solenoidInductance } from './coils/solenoid.ts';
import { type StraightWire, straightWireInductance } from './coils/straight-wire.ts';
import { type Toroid, toroidInductance } from './coils/toroid.ts';
import type { Method } from './method.ts';

/** A winding without a saturating core: its inductance is one number. */
export type LinearCoil =
  | Solenoid
  | Multilayer
  | RoundLoop
  | RectangularLoop
  | StraightWire
  | ParallelWires
  | CoaxialLine
  | FlatSpiral
  | Toroid;

/** Any winding, told apart by `shape`. */
export type Coil = LinearCoil | Cored;

export interface CoilInductance {
  readonly inductance_H: number;
  readonly method: Method;
}

/** Inductance of a winding that does not saturate. Throws `InvalidQuantity` where its dimensions contradict each other. */
export function linearInductance(coil: LinearCoil): CoilInductance {
  switch (coil.shape) {
    case 'solenoid':
      return solenoidInductance(coil);
    case 'multilayer':
      return multilayerInductance(coil);
    case 'round-loop':
      return roundLoopInductance(coil);
    case 'rectangular-loop':
      return rectangularLoopInductance(coil);
    case 'straight-wire':
      return straightWireInductance(coil);
    case 'parallel-wires':
      return parallelWiresInductance(coil);
    case 'coaxial-line':
      return coaxialLineInductance(coil);
    case 'flat-spiral':
      return flatSpiralInductance(coil);
    case 'toroid':
      return toroidInductance(coil);
  }
}

/** The flux characteristic of any winding; `temperature_degC` is the core's, and matters to a saturating core alone. */
export function coilCharacteristic(coil: Coil, temperature_degC?: number): FluxCharacteristic {
  if (coil.shape === 'cored') return coredCharacteristic(coil, temperature_degC);
  const { inductance_H, method } = linearInductance(coil);
  return linearCharacteristic(inductance_H, method);
}
