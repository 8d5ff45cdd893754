import { z } from 'zod';

/** RFC 9457 problem document; `found`, `wanted` and `advice` say what was found, what is wanted, what to do. */
export const problemSchema = z.object({
  type: z.string(),
  title: z.string(),
  status: z.number().int(),
  code: z.string(),
  detail: z.string().optional(),
  found: z.string().optional(),
  wanted: z.string().optional(),
  advice: z.string().optional(),
  /** Field errors of a rejected body or query: path joined by dots. */
  errors: z.array(z.object({ path: z.string(), message: z.string() })).optional(),
  /** With 409: the version that stands on the server. */
  current: z.unknown().optional(),
  /** With a refused drawing: the place it is about, longitude and latitude. */
  at: z.tuple([z.number(), z.number()]).optional(),
  retryAfterSeconds: z.number().optional(),
});
export type Problem = z.infer<typeof problemSchema>;
