import type { LotSummary } from '../../evidence/lot-summary.ts';
import type { Observation } from '../../evidence/observation.ts';
import { isOutOfCalibration } from '../../evidence/unit.ts';
import { capability } from '../../metrology/statistics/capability.ts';
import type { Method } from '../../physics/method.ts';
import type { Check } from '../check.ts';

/** Least Cpk of a lot where the duty names none: *common practice* for a process that is not under special watch. */
const LEAST_CPK = 1.33;

/** Two-sided normal 95 % reaches 1.96 standard deviations to either side. */
const WIDTH_OF_95_PERCENT = 2 * 1.959964;

const CAPABILITY: Method = {
  name: 'process capability index Cpk of the measured units',
  references: ['ISO 22514-2 (from memory)', 'A. F. Bissell, Applied Statistics 39 (1990) (from memory)'],
  relativeError: 0,
  validity: 'normal distribution; the units measured are a fair sample of the lot',
};

const CALIBRATION: Method = {
  name: 'dates of measurement against dates of calibration',
  references: ['ISO/IEC 17025:2017, 6.4 (from memory)'],
  relativeError: 0,
  validity: 'as the rigs are registered',
};

/** Is each cited lot capable of each of the drawing's limits? Cpk with the uncertainty that its confidence interval shows. */
export const lotCapability: Check = {
  name: 'lot-capability',
  counted: 'quantities of the lots',
  levers: ['/duty/evidence/minimumCpk'],
  observe: ({ evidence, duty }) => {
    const lower = duty.evidence?.minimumCpk ?? LEAST_CPK;
    return (evidence?.lotSummaries ?? []).flatMap((summary) => observeLot(summary, lower));
  },
};

function observeLot({ lot, quantities }: LotSummary, lower: number): Observation[] {
  return quantities.map(({ quantity, limit, n, mean, standardDeviation }) => {
    const common = {
      what: `Cpk of the ${quantity} over ${n} units of lot ${lot}`,
      unit: '1',
      limit: { lower },
      method: CAPABILITY,
      serial: `${lot} ${quantity}`,
    };
    if (mean === undefined || standardDeviation === undefined)
      return { ...common, undecided: 'fewer than two units were measured' };
    const inside = mean >= (limit.lower ?? mean) && mean <= (limit.upper ?? mean);
    if (standardDeviation === 0) {
      return inside
        ? { ...common, undecided: 'all values are equal, which shows no spread to judge' }
        : { ...common, missedBecause: 'every value is outside' };
    }
    const { value, interval } = capability({ n, mean, standardDeviation }, limit).cpk;
    return { ...common, value, standardUncertainty: (interval.upper - interval.lower) / WIDTH_OF_95_PERCENT };
  });
}

/** Were the rigs of all cited measurements in calibration? What a rig out of calibration measured leaves the matter open. */
export const calibration: Check = {
  name: 'calibration',
  counted: 'sets of measurements',
  levers: [],
  observe({ evidence }) {
    const lots = (evidence?.lotSummaries ?? []).map(({ lot, counts }) =>
      observeCalibration(`lot ${lot}`, counts.outOfCalibration),
    );
    const registered = (evidence?.units ?? []).filter((unit) => unit.calibrationDue !== undefined);
    const late = registered.filter(isOutOfCalibration).length;
    return registered.length > 0 ? [...lots, observeCalibration('the units sent', late)] : lots;
  },
};

function observeCalibration(whose: string, late: number): Observation {
  const common = {
    what: `Rigs that measured ${whose}`,
    unit: '1',
    limit: { upper: 0 },
    method: CALIBRATION,
    serial: whose,
  };
  return late === 0
    ? { ...common, metBecause: 'all were in calibration' }
    : { ...common, undecided: `${late} ${late === 1 ? 'unit was' : 'units were'} measured out of calibration` };
}
