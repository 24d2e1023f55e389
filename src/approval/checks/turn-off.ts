import type { Limit, Observation } from '../../evidence/observation.ts';
import { inWords } from '../../evidence/wording.ts';
import { within } from '../../physics/invalid-quantity.ts';
import { type Transient, transient } from '../../physics/transients/transient.ts';
import type { Check, CheckName } from '../check.ts';
import { constructionCharacteristic, observed, windingResistanceAt } from '../construction.ts';
import type { ApprovalRequest } from '../request.ts';

/** Temperature of the winding where the duty names none: cold, where its resistance helps least to bring the current down. */
const COLD_DEGC = 20;

/**
 * The interruption that the duty describes, of the part as constructed; undefined where either is missing. Without a described
 * winding its resistance is taken as zero, which makes the voltage, the time and the path's energy all at least what they will be.
 */
export function interruptionOf({ part: { construction }, duty }: ApprovalRequest): Transient | undefined {
  const { interruption } = duty;
  if (!interruption || !construction) return undefined;
  const { winding } = construction;
  const { path, source_V, safeCurrent_A } = interruption;
  const windingResistance_ohm = winding
    ? windingResistanceAt(winding, duty.ambient_degC ?? COLD_DEGC, '/duty/ambient_degC').resistance_ohm
    : 0;
  const characteristic = constructionCharacteristic(construction, duty.coreTemperature_degC);
  return within('/duty/interruption', () =>
    transient(characteristic, {
      event: 'interrupt',
      initialCurrent_A: duty.peakCurrent_A,
      windingResistance_ohm,
      path,
      samples: 2,
      ...(source_V !== undefined && { source_V }),
      ...(safeCurrent_A !== undefined && { safeCurrent_A }),
    }),
  );
}

type Interruption = NonNullable<ApprovalRequest['duty']['interruption']>;

interface Question {
  readonly name: CheckName;
  readonly what: string;
  readonly unit: string;
  readonly limitField: 'voltageLimit_V' | 'timeLimit_s' | 'pathEnergyLimit_J';
  readonly quantity: (
    course: Transient,
    interruption: Interruption,
  ) => { value: number } | { undecided: string } | { never: string };
}

function turnOffCheck({ name, what, unit, limitField, quantity }: Question): Check {
  return {
    name,
    levers: [
      '/part/construction/coil/turns',
      '/part/construction/coil/core/gap/length_m',
      '/duty/peakCurrent_A',
      '/duty/interruption/path/clamp_V',
      '/duty/interruption/path/resistance_ohm',
      '/duty/interruption/path/capacitance_F',
      '/duty/interruption/source_V',
      '/duty/interruption/safeCurrent_A',
      `/duty/interruption/${limitField}`,
    ],
    observe(request): readonly Observation[] {
      const interruption = request.duty.interruption;
      const upper = interruption?.[limitField];
      if (!interruption || upper === undefined) return [];
      const course = interruptionOf(request);
      if (!course) return [];
      const limit: Limit = { upper };
      const common = { what: `${what} from ${inWords(request.duty.peakCurrent_A, 'A')}`, unit, limit };
      const found = quantity(course, interruption);
      if ('value' in found) return [{ ...common, ...observed(found.value, course.method) }];
      if ('never' in found) return [{ ...common, method: course.method, missedBecause: found.never }];
      return [{ ...common, method: course.method, undecided: found.undecided }];
    },
  };
}

/** Does the voltage across the path stay below the duty's limit while the current is brought down? */
export const turnOffVoltage = turnOffCheck({
  name: 'turn-off-voltage',
  what: 'Peak voltage across the path on turn-off',
  unit: 'V',
  limitField: 'voltageLimit_V',
  quantity: ({ peakVoltage_V }) => ({ value: peakVoltage_V }),
});

/** Is the current safe (or, where no safe current is given, zero) within the duty's time? */
export const turnOffTime = turnOffCheck({
  name: 'turn-off-time',
  what: 'Time to a safe current on turn-off',
  unit: 's',
  limitField: 'timeLimit_s',
  quantity: ({ timeToSafe_s, timeToZero_s }, { safeCurrent_A }) => {
    if (safeCurrent_A === undefined) {
      return timeToZero_s === null
        ? { undecided: 'the current only approaches zero and the duty names no safe current' }
        : { value: timeToZero_s };
    }
    return timeToSafe_s === null
      ? { never: 'the current never settles below the safe current' }
      : { value: timeToSafe_s };
  },
});

/** Does the path take no more energy than it may? */
export const pathEnergy = turnOffCheck({
  name: 'path-energy',
  what: 'Energy that the path takes on turn-off',
  unit: 'J',
  limitField: 'pathEnergyLimit_J',
  quantity: ({ energy }) => ({ value: energy.path_J }),
});
