import { z } from 'zod';
import type { Sweep } from '../../physics/characteristics/measured.ts';
import type { Inductor } from '../../physics/inductor.ts';
import type { Cooling } from '../../physics/losses/temperature-rise.ts';
import type { Winding } from '../../physics/losses/winding-resistance.ts';
import { CoilSchema } from './coils.ts';
import { list } from './list.ts';
import { area_m2, inductance_H, length_m, turns } from './quantities.ts';

/** Readings in one sweep: more than any rig needs, few enough to answer at once. */
const MAXIMUM_READINGS = 10_000;

export const SweepSchema = z
  .strictObject({
    kind: z.enum(['differential', 'apparent']),
    current_A: list(z.number().min(0).max(1e9), { min: 2, max: MAXIMUM_READINGS }).meta({
      description: 'A, strictly increasing',
    }),
    inductance_H: list(inductance_H, { min: 2, max: MAXIMUM_READINGS }).meta({
      description: 'H, one for each current',
    }),
  })
  .meta({ id: 'Sweep', description: 'inductance over bias current, as a rig reads it' }) satisfies z.ZodType<Sweep>;

export const InductorSchema = z
  .union([
    z.strictObject({ inductance_H }),
    z.strictObject({ coil: CoilSchema }),
    z.strictObject({ sweep: SweepSchema }),
  ])
  .meta({
    id: 'Inductor',
    description: 'by its value, its construction, or its measured sweep',
  }) satisfies z.ZodType<Inductor>;

export const WindingSchema = z
  .strictObject({
    turns,
    meanTurnLength_m: length_m,
    wireDiameter_m: length_m.exactOptional().meta({ description: 'm, bare round conductor (of one strand)' }),
    foilThickness_m: length_m.exactOptional(),
    foilWidth_m: length_m.exactOptional(),
    strands: z.number().min(1).max(1e6).exactOptional().meta({ description: 'in parallel; default 1' }),
    layers: z.number().min(0.5).max(1e6).exactOptional().meta({ description: 'default 1' }),
    pitch_m: length_m.exactOptional().meta({ description: 'm, between neighbouring turns of a layer' }),
    conductor: z.enum(['copper', 'aluminium']).exactOptional().meta({ description: 'default copper' }),
    windowArea_m2: area_m2.exactOptional(),
  })
  .meta({ id: 'Winding', description: 'round wire or foil' }) satisfies z.ZodType<Winding>;

export const CoolingSchema = z
  .strictObject({
    thermalResistance_K_per_W: z.number().min(1e-6).max(1e6).exactOptional(),
    surfaceArea_m2: area_m2.exactOptional(),
  })
  .meta({
    id: 'Cooling',
    description: 'by a thermal resistance, or by the surface in still air',
  }) satisfies z.ZodType<Cooling>;
