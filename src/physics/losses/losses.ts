import { InvalidQuantity, within } from '../invalid-quantity.ts';
import type { Method } from '../method.ts';
import { type CopperLoss, copperLoss, type HarmonicLoss, type WindingCurrent } from './copper-loss.ts';
import { coreLoss, type Flux, type LossyCore } from './core-loss.ts';
import { type Cooling, temperatureRise } from './temperature-rise.ts';
import { type Winding, windowFill } from './winding-resistance.ts';

export interface LossesRequest {
  readonly winding: Winding;
  readonly current: WindingCurrent;
  readonly core?: LossyCore;
  readonly flux?: Flux;
  /** Of the winding; with `cooling`, of what surrounds the part. */
  readonly temperature_degC: number;
  readonly cooling?: Cooling;
}

export interface Losses {
  readonly directResistance_ohm: number;
  readonly harmonics?: readonly HarmonicLoss[];
  readonly copper_W: number;
  /** Zero where no core is given. */
  readonly core_W: number;
  readonly total_W: number;
  readonly rise_K?: number;
  /** Of the winding, which resistances and powers belong to: the one given or, with `cooling`, the steady one. */
  readonly temperature_degC: number;
  /** Bare conductor over window, where the winding says its window. */
  readonly conductorFillFactor?: number;
  /** All of the parts; `relativeError` is the largest of theirs. */
  readonly method: Method;
  /** Each part's own. */
  readonly methods: { readonly copper: Method; readonly core?: Method; readonly rise?: Method };
}

/**
 * What a part loses and how warm that makes it: copper by direct current and harmonics, core by its flux, both at the given
 * temperature or, with `cooling`, at the steady temperature above it.
 *
 * Throws `InvalidQuantity`, pointers relative to the request: `/core` or `/flux` where one comes without the other, `/core/loss`
 * where the loss is not a finite number, `/flux/…` as `igseLossDensity_W_per_m3`, `/winding/…` and `/current/…` as `copperLoss`,
 * `/temperature_degC` outside the conductor's range, and `/cooling` where no steady temperature exists, with the reason.
 */
export function losses(request: LossesRequest): Losses {
  const { winding, current, temperature_degC, cooling } = request;
  const core = coreOf(request);
  const fill = within('/winding', () => windowFill(winding));
  const { copper, rise, reached_degC } =
    cooling === undefined
      ? { copper: copperLoss(winding, current, temperature_degC), rise: undefined, reached_degC: temperature_degC }
      : steadyState(request, cooling, core);
  const core_W = core?.power_W ?? 0;
  const total_W = copper.copper_W + core_W;
  if (!Number.isFinite(total_W)) throw new InvalidQuantity('/current', 'the sum of the losses is not a finite number');
  const methods = {
    copper: copper.method,
    ...(core && { core: core.method }),
    ...(rise && { rise: rise.method }),
  };
  return {
    directResistance_ohm: copper.directResistance_ohm,
    ...(current.harmonics !== undefined && { harmonics: copper.harmonics }),
    copper_W: copper.copper_W,
    core_W,
    total_W,
    ...(rise && { rise_K: rise.rise_K }),
    temperature_degC: reached_degC,
    ...(fill !== undefined && { conductorFillFactor: fill }),
    method: combined(Object.values(methods)),
    methods,
  };
}

function coreOf({ core, flux }: LossesRequest): { power_W: number; method: Method } | undefined {
  if (core === undefined && flux === undefined) return undefined;
  if (flux === undefined) throw new InvalidQuantity('/flux', 'a core loses by its flux: give the flux as well');
  if (core === undefined)
    throw new InvalidQuantity('/core', 'a flux without a core loses nothing: give the core as well');
  const result = within('/flux', () => coreLoss(core, flux));
  if (!Number.isFinite(result.power_W)) {
    throw new InvalidQuantity('/core/loss', 'with this flux the core loss is not a finite number');
  }
  return result;
}

function steadyState(
  { winding, current, temperature_degC }: LossesRequest,
  cooling: Cooling,
  core: { power_W: number; method: Method } | undefined,
): { copper: CopperLoss; rise: { rise_K: number; method: Method }; reached_degC: number } {
  const state = atTemperature(() =>
    temperatureRise({ winding, current, ...(core && { core }), ambient_degC: temperature_degC, cooling }),
  );
  if (!state.steady) throw new InvalidQuantity('/cooling', state.reason);
  return { copper: state.copper, rise: state, reached_degC: state.temperature_degC };
}

/** The ambient is this request's temperature. */
function atTemperature<T>(calculate: () => T): T {
  try {
    return calculate();
  } catch (error) {
    if (error instanceof InvalidQuantity && error.pointer === '/ambient_degC') {
      throw new InvalidQuantity('/temperature_degC', error.detail);
    }
    throw error;
  }
}

function combined(parts: readonly Method[]): Method {
  return {
    name: parts.map((part) => part.name).join('; '),
    references: [...new Set(parts.flatMap((part) => part.references))],
    relativeError: Math.max(...parts.map((part) => part.relativeError)),
    validity: parts.map((part) => part.validity).join('; '),
  };
}
