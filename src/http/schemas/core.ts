import { z } from 'zod';
import type { Core } from '../../physics/core/core.ts';
import type { Material } from '../../physics/core/material.ts';
import { list } from './list.ts';
import {
  area_m2,
  field_A_per_m,
  fluxDensity_T,
  length_m,
  relativePermeability,
  temperature_degC,
} from './quantities.ts';
import { identifier } from './text.ts';

/** Entries of a table or list of a material: more than any data sheet prints. */
const MAXIMUM_ENTRIES = 1000;

export const SteinmetzLossSchema = z
  .strictObject({
    k: z.number().gt(1e-30).max(1e30),
    alpha: z.number().gt(0).max(10),
    beta: z.number().gt(0).max(10),
  })
  .meta({ id: 'SteinmetzLoss', description: 'P = k f^alpha B^beta in W/m³, f in Hz, B in T (peak)' });

export const InlineMaterialSchema = z
  .strictObject({
    initialPermeability: relativePermeability,
    saturation: z
      .union([
        z.strictObject({ fluxDensity_T }),
        list(z.strictObject({ temperature_degC, fluxDensity_T }), { min: 1, max: MAXIMUM_ENTRIES }),
      ])
      .exactOptional()
      .meta({
        description:
          'saturation flux density, one or a list over temperature, interpolated linearly and never extrapolated; without it the material is linear and has no flux limit',
      }),
    magnetisation: z
      .union([
        z.enum(['hyperbolic-tangent', 'arctangent', 'froehlich']),
        z.strictObject({
          field_A_per_m: list(z.union([z.literal(0), field_A_per_m]), { min: 2, max: MAXIMUM_ENTRIES }),
          fluxDensity_T: list(z.union([z.literal(0), fluxDensity_T]), { min: 2, max: MAXIMUM_ENTRIES }),
        }),
      ])
      .exactOptional()
      .meta({ description: 'default hyperbolic-tangent' }),
    loss: SteinmetzLossSchema.exactOptional(),
  })
  .meta({ id: 'Material', description: 'soft magnetic material' }) satisfies z.ZodType<Material>;

/**
 * A material, or the id of a registered one. The type says a material alone: ids are resolved before anything else sees the body
 * (approval/references.ts).
 */
export const MaterialSchema = z
  .union([InlineMaterialSchema, identifier])
  .meta({ description: 'inline, or the id of a registered material' }) as unknown as z.ZodType<Material, Material>;

const GapSchema = z
  .strictObject({
    length_m: length_m.meta({ description: 'm, each gap' }),
    count: z.int().min(1).max(1e6).exactOptional().meta({ description: 'gaps in series; default 1' }),
    legWidth_m: length_m.exactOptional(),
    legDepth_m: length_m.exactOptional(),
    legDiameter_m: length_m.exactOptional(),
    legLength_m: length_m.exactOptional().meta({ description: 'm, iron on either side of the gap; for conformal-map' }),
    area_m2: area_m2.exactOptional().meta({ description: 'm², a known gap area' }),
    fringing: z
      .enum(['expanded-area', 'conformal-map', 'none'])
      .exactOptional()
      .meta({ description: 'default expanded-area where the leg is given, none where it is not' }),
  })
  .meta({ id: 'Gap' });

const DimensionsSchema = z
  .discriminatedUnion('kind', [
    z.strictObject({
      kind: z.literal('ring'),
      outerDiameter_m: length_m,
      innerDiameter_m: length_m,
      height_m: length_m,
    }),
    z.strictObject({
      kind: z.literal('E'),
      width_m: length_m,
      height_m: length_m.meta({ description: 'm, of one half, from the mating face to the back' }),
      depth_m: length_m,
      windowHeight_m: length_m.meta({ description: 'm, of one half' }),
      outerLegSpacing_m: length_m.meta({ description: 'm, between the inner faces of the outer legs' }),
      centreLegWidth_m: length_m,
    }),
    z.strictObject({
      kind: z.literal('U'),
      width_m: length_m,
      height_m: length_m.meta({ description: 'm, of one half, from the mating face to the back' }),
      depth_m: length_m,
      windowHeight_m: length_m.meta({ description: 'm, of one half' }),
      windowWidth_m: length_m,
    }),
  ])
  .meta({
    id: 'CoreDimensions',
    description: 'effective parameters follow by IEC 60205; E and U are pairs of equal halves',
  });

export const CoreSchema = z
  .strictObject({
    effectiveArea_m2: area_m2.exactOptional(),
    effectiveLength_m: length_m.exactOptional(),
    minimumArea_m2: area_m2
      .exactOptional()
      .meta({ description: 'm², the smallest section; default the effective area' }),
    dimensions: DimensionsSchema.exactOptional().meta({ description: 'in place of the effective parameters' }),
    material: MaterialSchema,
    gap: GapSchema.exactOptional(),
  })
  .meta({ id: 'Core' }) satisfies z.ZodType<Core>;
