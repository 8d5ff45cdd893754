import { z } from 'zod';
import { emailSchema, idSchema, instantSchema } from './common.ts';
import { lineSchema } from './text.ts';

export const passwordSchema = z
  .string()
  .min(12, 'A password has at least 12 characters.')
  .max(200, 'A password has at most 200 characters.');

export const accountSchema = z.object({
  id: idSchema,
  email: z.string(),
  name: z.string(),
  siteAdmin: z.boolean(),
  /** Whether a letter tells when a run they started ends. */
  mailsRunEnd: z.boolean(),
  createdAt: instantSchema,
});
export type Account = z.infer<typeof accountSchema>;

export const signInSchema = z
  .object({ email: emailSchema, password: z.string().min(1, 'Type your password.').max(200) })
  .strict();
export type SignIn = z.infer<typeof signInSchema>;

export const sessionSchema = z.object({ account: accountSchema.nullable() });
export type Session = z.infer<typeof sessionSchema>;

export const changePasswordSchema = z
  .object({ current: z.string().min(1, 'Type your present password.').max(200), next: passwordSchema })
  .strict();
export const renameAccountSchema = z.object({ name: lineSchema(120).min(1, 'Type your name.') }).strict();
export const changeAccountSchema = z
  .object({ name: renameAccountSchema.shape.name.optional(), mailsRunEnd: z.boolean().optional() })
  .strict()
  .refine((change) => Object.keys(change).length > 0, 'Say what to change.');

/** A browser signed in to the account; `current` is the one asking. */
export const deviceSchema = z.object({
  id: z.string(),
  userAgent: z.string(),
  address: z.string(),
  lastSeenAt: instantSchema,
  current: z.boolean(),
});
export const deviceListSchema = z.object({ devices: z.array(deviceSchema) });

/** A welcome or reset link, opened: whom it is for. */
export const welcomeSchema = z.object({ email: z.string(), name: z.string(), purpose: z.enum(['welcome', 'reset']) });
export type Welcome = z.infer<typeof welcomeSchema>;
export const acceptWelcomeSchema = z
  .object({ name: lineSchema(120).min(1, 'Type your name.'), password: passwordSchema })
  .strict();
export const forgotPasswordSchema = z.object({ email: emailSchema }).strict();

export const siteAccountSchema = accountSchema.extend({
  state: z.enum(['invited', 'active', 'closed']),
  projectCount: z.number().int(),
});
export const siteAccountListSchema = z.object({ accounts: z.array(siteAccountSchema) });
export type SiteAccount = z.infer<typeof siteAccountSchema>;
export const createAccountSchema = z
  .object({
    email: emailSchema,
    name: lineSchema(120).min(1, 'Type a name.'),
    siteAdmin: z.boolean().default(false),
  })
  .strict();
export const updateAccountSchema = z
  .object({ siteAdmin: z.boolean().optional(), closed: z.boolean().optional() })
  .strict();
/** `link` is given only when no mail server is set up, so that it can be passed on by hand. */
export const accountLinkSchema = z.object({
  account: siteAccountSchema,
  mailed: z.boolean(),
  link: z.string().nullable(),
});

export const siteStorageSchema = z.object({
  sceneBytes: z.number(),
  runBytes: z.number(),
  incomingBytes: z.number(),
  freeBytes: z.number(),
});
