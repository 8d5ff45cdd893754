import { z } from 'zod';
import { colourSchema, idSchema, personSchema } from './common.ts';

/** A class that a reference point may be given. */
export const referenceClassSchema = z.object({
  id: idSchema,
  code: z.number().int(),
  name: z.string(),
  colour: colourSchema,
});

/** Where a figure comes from: the formula, who published it, and what went in. */
export const howSchema = z.object({
  formula: z.string(),
  source: z.string(),
  inputs: z.array(z.object({ name: z.string(), value: z.union([z.number(), z.string()]).nullable() })),
});
export type How = z.infer<typeof howSchema>;

const intervalSchema = z.object({ low: z.number(), high: z.number() });
/** A design-based figure. Null is "undefined", never 0. */
export const designFigureSchema = z.object({
  value: z.number().nullable(),
  standardError: z.number().nullable(),
  low: z.number().nullable(),
  high: z.number().nullable(),
  /** Points behind the denominator. */
  n: z.number().int(),
  /** Too few points for the large-sample interval; see `warning`. */
  isFragile: z.boolean(),
  /** Interval to quote where the figure is fragile; allows for what no point has shown. */
  cautious: intervalSchema.nullable(),
  how: howSchema,
});
export type DesignFigure = z.infer<typeof designFigureSchema>;

export const estimatesClassSchema = z.object({
  classId: idSchema,
  code: z.number().int(),
  name: z.string(),
  colour: z.string(),
  mappedPoints: z.number().int(),
  referencePoints: z.number().int(),
  users: designFigureSchema,
  producers: designFigureSchema,
  f1: designFigureSchema,
  areaShare: designFigureSchema,
  areaHa: designFigureSchema,
  mappedAreaHa: z.number(),
  /** Estimate less map. */
  differenceHa: z.number().nullable(),
  warning: z.string().nullable(),
});
export const estimatesSchema = z.object({
  designId: idSchema,
  runId: idSchema,
  digest: z.string(),
  /** How the design was drawn and what became of its points. */
  design: z.object({
    n: z.number().int(),
    used: z.number().int(),
    unsettled: z.number().int(),
    decided: z.number().int(),
    seed: z.number().int(),
    minSpacingMeters: z.number(),
    totalAreaHa: z.number(),
    strata: z.array(
      z.object({
        code: z.number().int(),
        name: z.string(),
        colour: z.string(),
        pixels: z.number().int(),
        areaHa: z.number(),
        weight: z.number(),
        drawn: z.number().int(),
        used: z.number().int(),
      }),
    ),
  }),
  /** Names the rows of both matrices: the classes, and what the map left unclassified where there is any (classId null). */
  rows: z.array(
    z.object({ classId: idSchema.nullable(), code: z.number().int(), name: z.string(), colour: z.string() }),
  ),
  /** Names the columns. */
  columns: z.array(referenceClassSchema),
  /** counts[mapped][reference]: rows are the mapped class, columns the reference class. */
  counts: z.array(z.array(z.number().int())),
  /** Estimated share of the area in each cell; null when a stratum has no usable point. */
  proportions: z.array(z.array(z.number())).nullable(),
  overall: designFigureSchema,
  kappa: designFigureSchema.extend({ caution: z.string() }),
  quantityDisagreement: designFigureSchema,
  allocationDisagreement: designFigureSchema,
  perClass: z.array(estimatesClassSchema),
  /** The map counted right also where it shows the interpreter's second choice: lenient, quoted beside and never instead. */
  eitherLabel: z.object({
    overall: designFigureSchema,
    perClass: z.array(z.object({ classId: idSchema, users: designFigureSchema, producers: designFigureSchema })),
  }),
  /** The project's target, against the interval of overall accuracy. */
  target: z.object({ overall: z.number(), verdict: z.enum(['met', 'missed', 'uncertain']) }).nullable(),
  /** Why there are no estimates, where there are none. */
  problem: z.string().nullable(),
  cautions: z.array(z.string()),
});
export type Estimates = z.infer<typeof estimatesSchema>;

export const agreementFigureSchema = z.object({
  value: z.number().nullable(),
  standardError: z.number().nullable(),
  low: z.number().nullable(),
  high: z.number().nullable(),
  n: z.number().int(),
  how: howSchema,
});
export const agreementSchema = z.object({
  designId: idSchema,
  interpreters: z.array(z.object({ person: personSchema.nullable(), answered: z.number().int() })),
  /** Points with at least two answers. */
  nPoints: z.number().int(),
  raw: agreementFigureSchema,
  /** Each pair of interpreters who share points; indices into `interpreters`. */
  cohen: z.array(z.object({ first: z.number().int(), second: z.number().int(), figure: agreementFigureSchema })),
  fleiss: agreementFigureSchema,
  krippendorff: agreementFigureSchema,
  /** By class in the design's order: `answers` name it, and another answer of the same point agrees so often. */
  perClass: z.array(
    z.object({ class: referenceClassSchema, answers: z.number().int(), figure: agreementFigureSchema }),
  ),
  /** answers[first][second] of the two interpreters with most points in common, by class in the design's order. */
  matrix: z.array(z.array(z.number().int())).nullable(),
  cautions: z.array(z.string()),
});
export type Agreement = z.infer<typeof agreementSchema>;

export const compareMapsQuerySchema = z.object({
  /** The other run; the first is the one the design was drawn for. */
  runId: idSchema,
});
/** Two maps judged on the same reference points. */
export const mapComparisonSchema = z.object({
  designId: idSchema,
  first: z.object({ runId: idSchema, number: z.number().int(), overall: z.number() }),
  second: z.object({ runId: idSchema, number: z.number().int(), overall: z.number() }),
  n: z.number().int(),
  /** First less second. */
  difference: z.number(),
  standardError: z.number().nullable(),
  low: z.number().nullable(),
  high: z.number().nullable(),
  covariance: z.number().nullable(),
  pValue: z.number().nullable(),
  /** Points only the first, only the second map has right. */
  onlyFirstRight: z.number().int(),
  onlySecondRight: z.number().int(),
  /** On plain counts; null when the maps are right at the same points. */
  mcNemar: z
    .object({
      chiSquare: z.number(),
      pValue: z.number(),
      exactPValue: z.number(),
      /** Which p to quote. */
      quoted: z.enum(['exact', 'chi-square']),
    })
    .nullable(),
  how: z.array(howSchema),
  cautions: z.array(z.string()),
});
export type MapComparison = z.infer<typeof mapComparisonSchema>;

export const compareKappasQuerySchema = z.object({
  /** The other design, drawn independently of the first. */
  designId: idSchema,
});
/** Kappas of two maps judged by independent designs. */
export const kappaComparisonSchema = z.object({
  first: z.object({
    designNumber: z.number().int(),
    runNumber: z.number().int(),
    kappa: z.number(),
    standardError: z.number(),
  }),
  second: z.object({
    designNumber: z.number().int(),
    runNumber: z.number().int(),
    kappa: z.number(),
    standardError: z.number(),
  }),
  z: z.number(),
  pValue: z.number(),
  how: howSchema,
  caution: z.string(),
});
export type KappaComparison = z.infer<typeof kappaComparisonSchema>;
