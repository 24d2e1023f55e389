import { type Losses, type LossesRequest, losses as lossesOf } from '../losses/losses.ts';
import { type Calculation, numbersOf } from './calculation.ts';

/** What a part loses, and how warm that makes it. */
export const losses: Calculation<LossesRequest, Losses> = {
  calculate: lossesOf,
  mainOutputs: ({ directResistance_ohm, copper_W, core_W, total_W, rise_K }) =>
    numbersOf({ directResistance_ohm, copper_W, core_W, total_W, rise_K }),
};
