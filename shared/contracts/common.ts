import { z } from 'zod';

export const idSchema = z.uuid({ error: 'An identifier is a UUID.' });
export const instantSchema = z.iso.datetime({ offset: true });
export const daySchema = z.iso.date({ error: 'A date is written yyyy-mm-dd.' });
export const colourSchema = z.string().regex(/^#[0-9a-fA-F]{6}$/, 'A colour is written #rrggbb.');
export const emailSchema = z
  .string()
  .trim()
  .toLowerCase()
  .max(254)
  .pipe(z.email({ error: 'This is not an e-mail address.' }));

/** A person, as others in the project see them. */
export const personSchema = z.object({ id: idSchema, name: z.string() });
export type Person = z.infer<typeof personSchema>;

export const emptySchema = z.object({}).strict();
