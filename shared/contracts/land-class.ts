import { z } from 'zod';
import { MAX_CLASS_CODE, MIN_CLASS_CODE } from '../constants/class-codes.ts';
import { colourSchema, idSchema } from './common.ts';
import { lineSchema, textSchema } from './text.ts';

export const landClassSchema = z.object({
  id: idSchema,
  projectId: idSchema,
  code: z.number().int(),
  name: z.string(),
  colour: z.string(),
  definition: z.string(),
  /** Place in the scheme, from 0; digit keys follow it. */
  position: z.number().int(),
  sampleCount: z.number().int(),
  version: z.number().int(),
});
export type LandClass = z.infer<typeof landClassSchema>;
export const landClassListSchema = z.object({ classes: z.array(landClassSchema) });

const codeSchema = z
  .number()
  .int('A code is a whole number.')
  .min(MIN_CLASS_CODE, 'Codes run from 1; 0 is unclassified.')
  .max(MAX_CLASS_CODE, 'Codes run to 254; 255 is nodata.');
const nameSchema = lineSchema(80).min(1, 'Give the class a name.');
const definitionSchema = textSchema(4_000);

export const createLandClassSchema = z
  .object({
    /** The next free code where not given. */
    code: codeSchema.optional(),
    name: nameSchema,
    colour: colourSchema,
    definition: definitionSchema.default(''),
  })
  .strict();
export type CreateLandClass = z.input<typeof createLandClassSchema>;
export const updateLandClassSchema = z
  .object({
    version: z.number().int(),
    code: codeSchema.optional(),
    name: nameSchema.optional(),
    colour: colourSchema.optional(),
    definition: definitionSchema.optional(),
  })
  .strict();
export const orderLandClassesSchema = z.object({ ids: z.array(idSchema).min(1).max(254) }).strict();
/** `moveSamplesTo` names the class that takes over the samples; needed when the class has any. */
export const deleteLandClassSchema = z.object({ moveSamplesTo: idSchema.optional() }).strict();
