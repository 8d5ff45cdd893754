import { z } from 'zod';
import { idSchema, instantSchema, personSchema } from './common.ts';
import { boundsSchema } from './geometry.ts';
import { jobSchema } from './job.ts';
import { postProcessingSchema } from './post-processing.ts';
import { sampleStateSchema } from './sample.ts';
import { lineSchema, textSchema } from './text.ts';

const seedSchema = z.number().int('A seed is a whole number.').min(0).max(4_294_967_295);

const forestFields = {
  trees: z.number().int().min(1, 'At least one tree.').max(2_000, 'At most 2000 trees.').default(100),
  maxDepth: z.number().int().min(1).max(64).default(25),
  minLeaf: z.number().int().min(1).max(10_000).default(1),
  /** Bands drawn for a split (random forest) or a tree (random-subspace forest); null is the square root of their number. */
  featuresPerTree: z.number().int().min(1).max(512).nullable().default(null),
};
export const classifierSchema = z.discriminatedUnion('kind', [
  z
    .object({
      kind: z.literal('random-forest'),
      ...forestFields,
      /** Balanced classes weigh the same however many training pixels they have. */
      classWeights: z.enum(['none', 'balanced']).default('none'),
    })
    .strict(),
  z.object({ kind: z.literal('random-subspace-forest'), ...forestFields }).strict(),
  z
    .object({
      kind: z.literal('nearest-neighbours'),
      neighbours: z.number().int().min(1).max(50).default(5),
      /** Whether bands are first brought to mean 0 and standard deviation 1. */
      standardise: z.boolean().default(true),
    })
    .strict(),
  z
    .object({
      kind: z.literal('gaussian-maximum-likelihood'),
      /** What is held likely before a pixel is seen: all classes alike, or as their training pixels stand. */
      priors: z.enum(['equal', 'training']).default('equal'),
      /** Share of the variance pooled over the classes that is added to each class's own; 0 adds nothing. */
      ridge: z.number().min(0, 'A ridge is 0 or more.').max(1, 'A ridge is at most 1.').default(0),
    })
    .strict(),
  z
    .object({
      kind: z.literal('minimum-distance'),
      metric: z.enum(['euclidean', 'mahalanobis']).default('mahalanobis'),
    })
    .strict(),
]);
export type ClassifierRecipe = z.infer<typeof classifierSchema>;

/** All that is needed to make the same class map again from the same scene and samples. */
export const recipeSchema = z
  .object({
    sceneId: idSchema,
    bandIds: z.array(idSchema).min(1, 'Choose at least one band.').max(64),
    classIds: z.array(idSchema).min(2, 'Choose at least two classes.').max(254),
    /** Share of each class's polygons held out of training for the accuracy figures. */
    heldOutShare: z.number().min(0.05, 'At least 5 % is held out.').max(0.9, 'At most 90 % is held out.').default(0.3),
    /** Review states of the samples that are used; by default all but returned ones. */
    sampleStates: z
      .array(sampleStateSchema)
      .min(1, 'Choose at least one review state.')
      .max(sampleStateSchema.options.length)
      .default(['draft', 'submitted', 'accepted']),
    seed: seedSchema.default(1),
    maxPixelsPerClass: z.number().int().min(10, 'At least 10 pixels a class.').max(200_000).default(1_000),
    classifier: classifierSchema,
    /** Pixels whose class has a smaller share of the votes, or a smaller chance, stay unclassified (code 0). */
    minShare: z.number().min(0, 'A share is 0 or more.').max(1, 'A share is at most 1.').default(0),
    /** Steps applied to the map in this order; absent where there are none. */
    postProcessing: postProcessingSchema.optional(),
  })
  .strict();
export type Recipe = z.infer<typeof recipeSchema>;

export const startRunSchema = z
  .object({
    name: lineSchema(120).default(''),
    note: textSchema(2_000).default(''),
    recipe: recipeSchema,
  })
  .strict();
export type StartRun = z.input<typeof startRunSchema>;

export const retryRunSchema = z
  .object({
    /** Without what an earlier attempt has left, for when that is what makes it fail. */
    anew: z.boolean().default(false),
  })
  .strict();

/** Checks of a recipe before it starts. */
export const recipeCheckSchema = z.object({
  problems: z.array(z.object({ severity: z.enum(['stops', 'warns']), text: z.string() })),
  perClass: z.array(
    z.object({
      classId: idSchema,
      name: z.string(),
      trainingPolygons: z.number().int(),
      heldOutPolygons: z.number().int(),
    }),
  ),
});
export type RecipeCheck = z.infer<typeof recipeCheckSchema>;

/** Rasters beside the class map, in whole percent: the winner's share of the votes, and its lead over the runner-up. */
export const runLayers = ['confidence', 'margin'] as const;
export const runLayerSchema = z.enum(runLayers);
export type RunLayer = z.infer<typeof runLayerSchema>;

export const classAreaSchema = z.object({
  classId: idSchema.nullable(),
  code: z.number().int(),
  name: z.string(),
  colour: z.string(),
  pixels: z.number().int(),
  areaHa: z.number(),
});

export const runSchema = z.object({
  id: idSchema,
  projectId: idSchema,
  number: z.number().int(),
  name: z.string(),
  note: z.string(),
  recipe: recipeSchema,
  /** The class scheme as it stood at the start. */
  classes: z.array(z.object({ id: idSchema, code: z.number().int(), name: z.string(), colour: z.string() })),
  sceneName: z.string(),
  job: jobSchema,
  startedBy: personSchema.nullable(),
  createdAt: instantSchema,
  trainingPixels: z.number().int().nullable(),
  trainingPolygons: z.number().int().nullable(),
  heldOutPolygons: z.number().int().nullable(),
  /** SHA-256 of the class raster's bytes, row-major, one byte a pixel. */
  classMapSha256: z.string().nullable(),
  /** SHA-256 over the samples' ids, versions and geometry and the scene's band digests. */
  inputSha256: z.string().nullable(),
  areas: z.array(classAreaSchema).nullable(),
  overallAccuracy: z.number().nullable(),
  /** 95 % interval of it; null where undefined. */
  overallLow: z.number().nullable(),
  overallHigh: z.number().nullable(),
  bounds: boundsSchema.nullable(),
  /** Layers the run has; runs made before there were layers have none. */
  layers: z.array(runLayerSchema),
  notes: z.array(z.string()),
  abilities: z.object({ cancel: z.boolean(), delete: z.boolean(), retry: z.boolean(), prioritise: z.boolean() }),
});
export type Run = z.infer<typeof runSchema>;
export const runListSchema = z.object({ runs: z.array(runSchema) });

export const runProbeSchema = z.object({ code: z.number().int().nullable(), name: z.string().nullable() });

/** How a run's model votes on one pixel. */
export const runVotesSchema = z.object({
  /** Class code on the current map; null where nothing is mapped. */
  code: z.number().int().nullable(),
  /** What the shares are: votes of trees or neighbours, or chances. */
  kind: z.enum(['votes', 'chances']),
  /** Of all classes, the most likely first; empty where a band has no data or the place lies outside the study area. */
  shares: z.array(z.object({ classId: idSchema, share: z.number() })),
  /** The first share, and what it has more than the second. */
  confidence: z.number().nullable(),
  margin: z.number().nullable(),
});
export type RunVotes = z.infer<typeof runVotesSchema>;
