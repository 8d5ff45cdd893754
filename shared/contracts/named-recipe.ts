import { z } from 'zod';
import { idSchema, instantSchema, personSchema } from './common.ts';
import { recipeSchema } from './run.ts';
import { lineSchema, textSchema } from './text.ts';

const nameSchema = lineSchema(120).min(1, 'Give the recipe a name.');
export const createNamedRecipeSchema = z
  .object({ name: nameSchema, note: textSchema(2_000).default(''), recipe: recipeSchema })
  .strict();
export type CreateNamedRecipe = z.input<typeof createNamedRecipeSchema>;
export const updateNamedRecipeSchema = z
  .object({
    version: z.number().int(),
    name: nameSchema.optional(),
    note: textSchema(2_000).optional(),
    recipe: recipeSchema.optional(),
  })
  .strict();
export type UpdateNamedRecipe = z.input<typeof updateNamedRecipeSchema>;
export const namedRecipeSchema = z.object({
  id: idSchema,
  projectId: idSchema,
  name: z.string(),
  note: z.string(),
  recipe: recipeSchema,
  version: z.number().int(),
  createdBy: personSchema.nullable(),
  updatedAt: instantSchema,
  abilities: z.object({ change: z.boolean() }),
});
export type NamedRecipe = z.infer<typeof namedRecipeSchema>;
export const namedRecipeListSchema = z.object({ recipes: z.array(namedRecipeSchema) });

/** Which recipe: "run:<id>" or "recipe:<id>". */
export const recipeRefSchema = z
  .string()
  .regex(/^(run|recipe):[0-9a-f-]{36}$/, 'Name a recipe as run:<id> or recipe:<id>.');
export const recipeDiffQuerySchema = z.object({ left: recipeRefSchema, right: recipeRefSchema });
export const recipeDifferenceSchema = z.object({
  /** Path in the recipe, dotted: "classifier.trees". */
  path: z.string(),
  /** Its name in plain words: "Trees". */
  label: z.string(),
  /** Null where this side has no such setting. */
  left: z.string().nullable(),
  right: z.string().nullable(),
});
export type RecipeDifference = z.infer<typeof recipeDifferenceSchema>;
export const recipeDiffSchema = z.object({
  left: z.object({ title: z.string() }),
  right: z.object({ title: z.string() }),
  differences: z.array(recipeDifferenceSchema),
  /** What else sets the two apart that no setting shows: other samples, another study area. */
  notes: z.array(z.string()),
});
export type RecipeDiff = z.infer<typeof recipeDiffSchema>;
