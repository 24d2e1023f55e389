import { z } from 'zod';
import type { Duty } from '../../approval/duty.ts';
import type { Part } from '../../approval/part.ts';
import type { SentRequest } from '../../approval/request.ts';
import type { Instrument } from '../../evidence/instrument.ts';
import type { SentUnit } from '../../evidence/unit.ts';
import { CoilSchema } from './coils.ts';
import { CoolingSchema, SweepSchema, WindingSchema } from './inductor.ts';
import { list } from './list.ts';
import { PathSchema } from './path.ts';
import { PulseSchema } from './pulse.ts';
import * as q from './quantities.ts';
import { identifier, text } from './text.ts';
import { UncertaintyMap } from './uncertainty.ts';

const DrawingSchema = z
  .strictObject({
    inductance: z
      .strictObject({
        nominal_H: q.inductance_H,
        lower_H: q.inductance_H,
        upper_H: q.inductance_H,
        testCurrent_A: z.number().min(0).max(1e9).exactOptional().meta({ description: 'A; default 0' }),
        testFrequency_Hz: q.frequency_Hz.exactOptional(),
      })
      .refine(({ lower_H, upper_H }) => lower_H < upper_H, { message: 'must exceed lower_H', path: ['upper_H'] }),
    resistance: z.strictObject({ upper_ohm: q.resistance_ohm, temperature_degC: q.temperature_degC }).exactOptional(),
    saturation: z
      .strictObject({
        current_A: q.positiveCurrent_A,
        inductanceDrop: q.fraction,
        temperature_degC: q.temperature_degC,
      })
      .exactOptional(),
    thermal: z.strictObject({ current_A: q.positiveCurrent_A, rise_K: q.rise_K }).exactOptional(),
  })
  .meta({ id: 'Drawing', description: 'what the drawing promises' });

export const PartSchema = z
  .strictObject({
    number: text(100),
    revision: text(40),
    description: text(500).exactOptional(),
    drawing: DrawingSchema.exactOptional(),
    construction: z
      .strictObject({
        coil: CoilSchema,
        winding: WindingSchema.exactOptional(),
        cooling: CoolingSchema.exactOptional(),
      })
      .exactOptional()
      .meta({ description: 'how the part is made' }),
  })
  .meta({ id: 'Part', description: 'a part at a revision' }) satisfies z.ZodType<Part>;

export const DutySchema = z
  .strictObject({
    peakCurrent_A: q.positiveCurrent_A,
    rmsCurrent_A: q.positiveCurrent_A.exactOptional(),
    rippleCurrent_A: q.positiveCurrent_A.exactOptional().meta({ description: 'A, peak to peak' }),
    frequency_Hz: q.frequency_Hz.exactOptional(),
    ambient_degC: q.temperature_degC.exactOptional(),
    coreTemperature_degC: q.temperature_degC.exactOptional(),
    required: z
      .strictObject({
        inductanceAtPeak_H: q.inductance_H.exactOptional(),
        storedEnergy_J: q.energy_J.exactOptional(),
        fluxMargin: z.number().min(0).lt(1).exactOptional().meta({
          description:
            'how far below saturation the flux density must stay, as a fraction of the saturation flux density',
        }),
      })
      .exactOptional(),
    interruption: z
      .strictObject({
        path: PathSchema,
        source_V: q.voltage_V.exactOptional(),
        voltageLimit_V: q.positiveVoltage_V.exactOptional(),
        timeLimit_s: q.time_s.exactOptional(),
        safeCurrent_A: q.positiveCurrent_A.exactOptional(),
        pathEnergyLimit_J: q.energy_J.exactOptional(),
      })
      .exactOptional(),
    strayField: z.strictObject({ distance_m: q.length_m, limit_T: q.fluxDensity_T }).exactOptional(),
    hotspotLimit_degC: q.temperature_degC.exactOptional(),
    evidence: z
      .strictObject({
        minimumUnits: z.int().min(0).max(1e9).exactOptional(),
        minimumCpk: z
          .number()
          .min(0)
          .max(10)
          .exactOptional()
          .meta({ description: 'of each cited lot; default 1.33, common practice' }),
      })
      .exactOptional(),
    risk: q.risk.exactOptional(),
  })
  .meta({ id: 'Duty', description: 'what a place of use asks of a part' }) satisfies z.ZodType<Duty>;

const relative = z.number().min(0).max(1).exactOptional();
const offset = q.standardUncertainty.exactOptional();

export const InstrumentSchema = z
  .strictObject({
    inductance: z.strictObject({ relative, offset_H: offset }).exactOptional(),
    current: z.strictObject({ relative, offset_A: offset }).exactOptional(),
    resistance: z.strictObject({ relative, offset_ohm: offset }).exactOptional(),
    voltage: z.strictObject({ relative, offset_V: offset }).exactOptional(),
  })
  .meta({
    id: 'Instrument',
    description:
      'standard uncertainties (k = 1): a gain relative to the reading and an offset, each common to all readings',
  }) satisfies z.ZodType<Instrument>;

const unitFields = {
  serial: text(100),
  measuredAt: z.iso.datetime({ offset: true }),
  rig: identifier.exactOptional().meta({ description: 'a registered rig, in place of an inline instrument' }),
  instrument: InstrumentSchema.exactOptional(),
  temperature_degC: q.temperature_degC.exactOptional(),
  resistance_ohm: q.resistance_ohm.exactOptional(),
};

const oneInstrument = (unit: { readonly rig?: string; readonly instrument?: Instrument }) =>
  (unit.rig === undefined) !== (unit.instrument === undefined);
const instrumentProblem = {
  message: 'a unit has a registered rig or an inline instrument, one of the two',
  path: ['rig'],
};

/** With a sweep, or with the raw pulse that one is analysed from. */
export const UnitSchema = z
  .union([
    z.strictObject({ ...unitFields, sweep: SweepSchema }).refine(oneInstrument, instrumentProblem),
    z.strictObject({ ...unitFields, pulse: PulseSchema }).refine(oneInstrument, instrumentProblem),
  ])
  .meta({ description: 'one measured unit' }) satisfies z.ZodType<SentUnit>;

/** A unit as an approval records it: with what was registered of its rig. */
export const RecordedUnitSchema = z
  .object({
    ...unitFields,
    sweep: SweepSchema,
    fromPulse: z.literal(true).exactOptional().meta({ description: 'the sweep was analysed from a pulse' }),
    calibrationDue: z.string().exactOptional(),
  })
  .meta({ id: 'RecordedUnit' });

export const ApprovalRequestSchema = z.strictObject({
  part: PartSchema,
  duty: DutySchema,
  evidence: z
    .strictObject({
      lots: list(identifier, { max: 100 }).exactOptional().meta({ description: 'registered lots of the part' }),
      units: list(UnitSchema, { max: 1000 }).exactOptional(),
    })
    .exactOptional(),
  uncertainty: UncertaintyMap.exactOptional(),
}) satisfies z.ZodType<SentRequest>;
