import { z } from 'zod';
import type { Coil } from '../../physics/coil.ts';
import { CoreSchema } from './core.ts';
import { length_m, lengthOrZero_m, relativePermeability, turns } from './quantities.ts';

export const Solenoid = z
  .strictObject({
    shape: z.literal('solenoid'),
    turns,
    diameter_m: length_m.meta({ description: 'm, wire centre to wire centre' }),
    length_m: length_m.meta({ description: 'm, turns × pitch' }),
    wireDiameter_m: length_m.exactOptional().meta({
      description: 'm, bare conductor; with it the coil is wound of round wire, without it the ideal current sheet',
    }),
  })
  .meta({ id: 'Solenoid', description: 'single-layer cylindrical coil' });

export const Multilayer = z
  .strictObject({
    shape: z.literal('multilayer'),
    turns,
    innerDiameter_m: lengthOrZero_m,
    outerDiameter_m: length_m,
    length_m,
  })
  .meta({ id: 'Multilayer', description: 'rectangular winding section, uniform current density' });

export const RoundLoop = z
  .strictObject({
    shape: z.literal('round-loop'),
    diameter_m: length_m.meta({ description: 'm, of the centre line' }),
    wireDiameter_m: length_m,
    turns: turns.exactOptional().meta({ description: 'bundled turns that share the section; default 1' }),
  })
  .meta({ id: 'RoundLoop', description: 'circle of round wire, uniform current density' });

export const RectangularLoop = z
  .strictObject({
    shape: z.literal('rectangular-loop'),
    sideA_m: length_m,
    sideB_m: length_m,
    wireDiameter_m: length_m,
  })
  .meta({ id: 'RectangularLoop', description: 'rectangle of round wire; sides along the centre line' });

export const StraightWire = z
  .strictObject({ shape: z.literal('straight-wire'), length_m, wireDiameter_m: length_m })
  .meta({ id: 'StraightWire', description: 'partial inductance of one straight round wire' });

export const ParallelWires = z
  .strictObject({
    shape: z.literal('parallel-wires'),
    length_m,
    spacing_m: length_m.meta({ description: 'm, between centres' }),
    wireDiameter_m: length_m,
  })
  .meta({ id: 'ParallelWires', description: 'go and return of round wire' });

export const CoaxialLine = z
  .strictObject({
    shape: z.literal('coaxial-line'),
    length_m,
    innerDiameter_m: length_m,
    shieldInnerDiameter_m: length_m,
    shieldOuterDiameter_m: length_m.exactOptional().meta({ description: 'm; without it the shield has no thickness' }),
  })
  .meta({ id: 'CoaxialLine', description: 'inner conductor and shield, uniform current density in each' });

export const FlatSpiral = z
  .strictObject({
    shape: z.literal('flat-spiral'),
    outline: z.enum(['circle', 'square', 'hexagon', 'octagon']),
    turns,
    outerDiameter_m: length_m.meta({ description: 'm; of a polygon across its flats' }),
    trackWidth_m: length_m,
    trackSpacing_m: length_m,
    trackThickness_m: length_m.exactOptional(),
  })
  .meta({ id: 'FlatSpiral', description: 'spiral of flat track' });

const RectangularToroid = z
  .strictObject({
    shape: z.literal('toroid'),
    section: z.literal('rectangle'),
    turns,
    innerDiameter_m: length_m,
    outerDiameter_m: length_m,
    height_m: length_m,
    relativePermeability: relativePermeability.exactOptional(),
  })
  .meta({ id: 'RectangularToroid', description: 'toroid of rectangular section' });

const CircularToroid = z
  .strictObject({
    shape: z.literal('toroid'),
    section: z.literal('circle'),
    turns,
    meanDiameter_m: length_m,
    sectionDiameter_m: length_m,
    relativePermeability: relativePermeability.exactOptional(),
  })
  .meta({ id: 'CircularToroid', description: 'toroid of circular section' });

export const Toroid = z.discriminatedUnion('section', [RectangularToroid, CircularToroid]).meta({ id: 'Toroid' });

export const Cored = z
  .strictObject({ shape: z.literal('cored'), turns, core: CoreSchema })
  .meta({ id: 'Cored', description: 'winding on a magnetic core, with or without gap' });

export const CoilSchema = z
  .discriminatedUnion('shape', [
    Solenoid,
    Multilayer,
    RoundLoop,
    RectangularLoop,
    StraightWire,
    ParallelWires,
    CoaxialLine,
    FlatSpiral,
    Toroid,
    Cored,
  ])
  .meta({ id: 'Coil', description: 'a winding, told apart by shape' }) satisfies z.ZodType<Coil>;
