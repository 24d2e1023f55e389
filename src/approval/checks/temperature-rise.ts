import type { Observation } from '../../evidence/observation.ts';
import { inWords } from '../../evidence/wording.ts';
import { coreParameters } from '../../physics/core/core.ts';
import { within } from '../../physics/invalid-quantity.ts';
import type { WindingCurrent } from '../../physics/losses/copper-loss.ts';
import { coreLoss } from '../../physics/losses/core-loss.ts';
import { type Cooling, temperatureRise as steadyRise } from '../../physics/losses/temperature-rise.ts';
import type { Winding } from '../../physics/losses/winding-resistance.ts';
import type { Method } from '../../physics/method.ts';
import type { Check } from '../check.ts';
import { COIL_POINTER, constructionCharacteristic, WINDING_LEVERS, windingResistanceAt } from '../construction.ts';
import type { Construction } from '../part.ts';
import type { ApprovalRequest } from '../request.ts';

/** What surrounds the part where neither duty nor drawing says: an indoor laboratory, at which rises are usually stated. */
const LABORATORY_DEGC = 25;

/**
 * Does the part stay below the drawing's rise at the drawing's current, and below the duty's hot-spot limit in the duty? Winding and
 * core are taken as one temperature. Where the construction states no cooling, the duty's is the one that makes the drawing's
 * promise true: its rise at its current.
 */
export const temperatureRise: Check = {
  name: 'temperature-rise',
  levers: [
    ...WINDING_LEVERS,
    '/part/construction/cooling/thermalResistance_K_per_W',
    '/part/construction/cooling/surfaceArea_m2',
    '/duty/rmsCurrent_A',
    '/duty/hotspotLimit_degC',
    '/part/drawing/thermal/current_A',
    '/part/drawing/thermal/rise_K',
  ],
  observe: (request) => [...promisedRise(request), ...hotSpot(request)],
};

/** The drawing's rise, direct current alone, of a construction that states its cooling. */
function promisedRise({ part: { drawing, construction } }: ApprovalRequest): Observation[] {
  const thermal = drawing?.thermal;
  if (!thermal || !construction?.winding || !construction.cooling) return [];
  const what = `Temperature rise at ${inWords(thermal.current_A, 'A')}`;
  const limit = { upper: thermal.rise_K };
  const state = heated(construction.winding, { direct_A: thermal.current_A }, construction.cooling, LABORATORY_DEGC);
  if (!state.steady) return [{ what, unit: 'K', limit, method: state.method, missedBecause: state.reason }];
  return [{ what, unit: 'K', limit, value: state.rise_K, ...errorOf(state.rise_K, state.method) }];
}

/** The duty's hottest temperature, winding and core losses together. */
function hotSpot(request: ApprovalRequest): Observation[] {
  const { part, duty } = request;
  const upper = duty.hotspotLimit_degC;
  const winding = part.construction?.winding;
  if (upper === undefined || !part.construction || !winding) return [];
  const ambient_degC = duty.ambient_degC ?? LABORATORY_DEGC;
  const common = { what: `Hot spot at an ambient of ${inWords(ambient_degC, '°C')}`, unit: '°C', limit: { upper } };
  const cooling = part.construction.cooling ?? impliedCooling(request, winding);
  if (duty.rmsCurrent_A === undefined || !cooling) {
    const missing = cooling
      ? 'the duty names no rms current'
      : 'neither the construction nor the drawing says how the part cools';
    return [{ ...common, method: UNKNOWN, undecided: missing }];
  }
  const core = rippleCoreLoss(part.construction, request);
  const state = heated(
    winding,
    dutyCurrent(duty.rmsCurrent_A, request),
    cooling,
    ambient_degC,
    core === 'unknown' ? undefined : core,
  );
  if (!state.steady) return [{ ...common, method: state.method, missedBecause: state.reason }];
  return [
    {
      ...common,
      value: state.temperature_degC,
      ...errorOf(state.rise_K, state.method),
      ...(core === 'unknown' && { passIsUndecided: 'the core loses as well, and its material states no loss' }),
    },
  ];
}

const UNKNOWN: Method = { name: 'none', references: [], relativeError: 1, validity: 'losses or cooling unknown' };

/** The rise carries the model's error; the ambient beneath it does not. */
const errorOf = (rise_K: number, method: Method) => ({
  standardUncertainty: (rise_K * method.relativeError) / Math.sqrt(3),
  method,
});

function heated(
  winding: Winding,
  current: WindingCurrent,
  cooling: Cooling,
  ambient_degC: number,
  core?: { readonly power_W: number; readonly method: Method },
) {
  return within(
    '/part/construction',
    () => steadyRise({ winding, current, cooling, ambient_degC, ...(core !== undefined && { core }) }),
    { '/ambient_degC': '/duty/ambient_degC' },
  );
}

/** The thermal resistance that the drawing's rise at its current amounts to. */
function impliedCooling({ part: { drawing } }: ApprovalRequest, winding: Winding): Cooling | undefined {
  if (!drawing?.thermal) return undefined;
  const { current_A, rise_K } = drawing.thermal;
  const hot = windingResistanceAt(winding, LABORATORY_DEGC + rise_K, '/part/drawing/thermal/rise_K');
  return { thermalResistance_K_per_W: rise_K / (current_A ** 2 * hot.resistance_ohm) };
}

/** The duty's rms current as a direct one and a triangular ripple of rms Δ/√12, all of it at the ripple's frequency. */
function dutyCurrent(rmsCurrent_A: number, { duty }: ApprovalRequest): WindingCurrent {
  const { rippleCurrent_A, frequency_Hz } = duty;
  if (rippleCurrent_A === undefined || frequency_Hz === undefined) return { direct_A: rmsCurrent_A };
  const ripple_A = Math.min(rippleCurrent_A / Math.sqrt(12), rmsCurrent_A);
  const direct_A = Math.sqrt((rmsCurrent_A - ripple_A) * (rmsCurrent_A + ripple_A));
  return { direct_A, harmonics: [{ frequency_Hz, rms_A: ripple_A }] };
}

/** Loss of the core under the ripple's symmetric triangle of flux, up to the peak current; none without a ripple, unknown without loss data. */
function rippleCoreLoss(construction: Construction, { duty }: ApprovalRequest) {
  const { coil } = construction;
  const { rippleCurrent_A, frequency_Hz, peakCurrent_A, coreTemperature_degC } = duty;
  if (coil.shape !== 'cored' || rippleCurrent_A === undefined || frequency_Hz === undefined) return undefined;
  const { loss } = coil.core.material;
  if (!loss) return 'unknown';
  const characteristic = constructionCharacteristic(construction, coreTemperature_degC);
  const swing_Wb =
    characteristic.fluxLinkage_Wb(peakCurrent_A) - characteristic.fluxLinkage_Wb(peakCurrent_A - rippleCurrent_A);
  return within(COIL_POINTER, () => {
    const { effectiveArea_m2, effectiveVolume_m3 } = within('/core', () => coreParameters(coil.core));
    const swing_T = swing_Wb / (coil.turns * effectiveArea_m2);
    return coreLoss(
      { volume_m3: effectiveVolume_m3, loss },
      { frequency_Hz, phase: [0, 0.5, 1], fluxDensity_T: [0, swing_T, 0] },
    );
  });
}
