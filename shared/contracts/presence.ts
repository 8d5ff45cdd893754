import { z } from 'zod';
import { idSchema, instantSchema, personSchema } from './common.ts';

/** A desk says it is open this often, ms. */
export const PRESENCE_BEAT_MS = 8_000;
/** Whoever was not heard of for so long is gone, ms; what they held is free again. */
export const PRESENCE_LASTS_MS = 25_000;

export const presenceSchema = z.object({
  person: personSchema,
  /** The sample they are changing. */
  editingSampleId: idSchema.nullable(),
  seenAt: instantSchema,
});
export type Presence = z.infer<typeof presenceSchema>;
export const presenceListSchema = z.object({ people: z.array(presenceSchema) });
export const sayPresenceSchema = z
  .object({ /** One open desk; a person may have several. */ deskId: idSchema, editingSampleId: idSchema.nullable() })
  .strict();
export const leaveDeskSchema = z.object({ deskId: idSchema }).strict();
