import { z } from 'zod';
import { idSchema } from './common.ts';
import { drawingSchema } from './geometry.ts';

/** Which bands the separability is computed over; all of the scene's where left out. */
export const signatureQuerySchema = z.object({
  bands: z
    .string()
    .regex(/^\d+(,\d+)*$/, 'Band numbers with commas between.')
    .optional(),
});

/** A band of the scene, or an index computed from its bands; columns of `points` and `histograms`. */
export const signatureFeatureSchema = z.object({
  key: z.string(),
  kind: z.enum(['band', 'index']),
  name: z.string(),
  /** Number of the band; null for an index. */
  number: z.number().int().nullable(),
  centreWavelengthUm: z.number().nullable(),
  /** What is measured: reflectance, kelvin, digital number, or index. */
  quantity: z.string(),
  /** Formula of an index. */
  formula: z.string().nullable(),
});
export type SignatureFeature = z.infer<typeof signatureFeatureSchema>;

export const classSignatureSchema = z.object({
  classId: idSchema,
  name: z.string(),
  colour: z.string(),
  /** Place in the scheme, which gives the pattern. */
  position: z.number().int(),
  nSamples: z.number().int(),
  nPixels: z.number().int(),
  /** Share of all training pixels. */
  share: z.number(),
  /** Of all its pixels, scaled, per feature; null without pixels, or where an index is undefined. */
  mean: z.array(z.number().nullable()),
  standardDeviation: z.array(z.number().nullable()),
  /** Covariance over `points` between features, row-major; null below three points or where undefined. */
  covariance: z.array(z.number().nullable()),
  /** Squares of a grid over the scene's samples that hold one of the class, and how many squares hold any sample. */
  squares: z.number().int(),
  /** Pixels wanted by the rule of thumb for the chosen bands. */
  pixelsWanted: z.number().int(),
  samplesWanted: z.number().int(),
  /** What to think of, in words; empty when nothing is amiss. */
  remarks: z.array(z.string()),
});

export const separabilityPairSchema = z.object({
  /** Places in `classes`. */
  first: z.number().int(),
  second: z.number().int(),
  bhattacharyya: z.number().nullable(),
  /** sqrt(2(1 − e^−B)), 0 to 1.414. */
  jeffriesMatusita: z.number().nullable(),
  /** 2(1 − e^−B), 0 to 2. */
  jeffriesMatusitaSquared: z.number().nullable(),
  /** 0 to 2. */
  transformedDivergence: z.number().nullable(),
  /** Pixels of the two classes taken for each other at most, were both normal and equally frequent: e^−B / 2. */
  errorBound: z.number().nullable(),
  /** Why there is no figure. */
  reason: z.string().nullable(),
  /** Band that alone tells the two apart best. */
  bestBand: z.string().nullable(),
});

export const signatureSetSchema = z.object({
  sceneId: idSchema,
  /** Band numbers the separability is over. */
  bands: z.array(z.number().int()),
  features: z.array(signatureFeatureSchema),
  classes: z.array(classSignatureSchema),
  /** Samples that lie in the scene, and those of the project that do not. */
  nSamples: z.number().int(),
  nOutside: z.number().int(),
  squares: z.number().int(),
  /** Pixels for scatter and histograms: at most so many of each sample, evenly over it. */
  pixelsPerSample: z.number().int(),
  points: z.object({
    /** Place in `classes` and in `sampleIds` of each point. */
    classIndex: z.array(z.number().int()),
    sampleIndex: z.array(z.number().int()),
    /** Scaled values by feature, then by point. */
    values: z.array(z.array(z.number().nullable())),
  }),
  sampleIds: z.array(idSchema),
  histograms: z.array(
    z.object({
      from: z.number(),
      to: z.number(),
      /** By class, then by bin of equal width. */
      counts: z.array(z.array(z.number().int())),
    }),
  ),
  pairs: z.array(separabilityPairSchema),
  /** Pairs at risk, worst first, with what would help. */
  risks: z.array(z.object({ pair: z.number().int(), text: z.string(), advice: z.string() })),
});
export type SignatureSet = z.infer<typeof signatureSetSchema>;

/** Asked while a sample is drawn or looked at. */
export const judgeDrawingSchema = z
  .object({
    sceneId: idSchema,
    classId: idSchema,
    geometry: drawingSchema,
    /** The sample being looked at, which is not held against itself. */
    sampleId: idSchema.optional(),
  })
  .strict();

/** How a drawing stands to the samples that are there. */
export const drawingJudgementSchema = z.object({
  /** Mean and deviation of its class and of the nearest other ones, by band, scaled. */
  rivals: z.array(
    z.object({
      classId: idSchema,
      isOwn: z.boolean(),
      nSamples: z.number().int(),
      mean: z.array(z.number().nullable()),
      standardDeviation: z.array(z.number().nullable()),
      /** Mahalanobis distance of the drawing's mean from the class; null where it cannot be computed. */
      distance: z.number().nullable(),
    }),
  ),
  typicality: z
    .object({
      distance: z.number(),
      pValue: z.number(),
      nSamples: z.number().int(),
      isPooled: z.boolean(),
    })
    .nullable(),
  /** Why there is no typicality. */
  noTypicality: z.string().nullable(),
  /** Median over the bands of its standard deviation against what is usual within samples of the class. */
  mixing: z.object({ ratio: z.number(), isMixed: z.boolean() }).nullable(),
  /** Samples of another class that share pixels with it. */
  overlaps: z.array(
    z.object({ sampleId: idSchema, number: z.number().int(), classId: idSchema, pixels: z.number().int() }),
  ),
  /** The nearest sample that the latest finished run held out; null when none is near. */
  heldOut: z
    .object({
      runNumber: z.number().int(),
      sampleNumber: z.number().int(),
      distanceMeters: z.number(),
      /** The drawing is that sample itself. */
      isItself: z.boolean(),
    })
    .nullable(),
  /** What to think of before saving, most important first. */
  warnings: z.array(z.string()),
});
export type DrawingJudgement = z.infer<typeof drawingJudgementSchema>;
