import { z } from 'zod';
import { idSchema, instantSchema, personSchema } from './common.ts';
import { boundsSchema, polygonSchema, positionSchema } from './geometry.ts';
import { referenceClassSchema } from './reference-estimates.ts';
import { confidenceSchema } from './sample.ts';
import { lineSchema, textSchema } from './text.ts';

export * from './reference-estimates.ts';

const shareSchema = z.number().min(0).max(1);

/** How n points are shared out among strata; `minimum` gives `atLeast` to each and the rest in proportion to area. */
export const allocationSchema = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('equal') }).strict(),
  z.object({ kind: z.literal('proportional') }).strict(),
  z.object({ kind: z.literal('neyman') }).strict(),
  z
    .object({ kind: z.literal('minimum'), atLeast: z.number().int().min(2, 'At least two points.').max(5_000) })
    .strict(),
]);
export type Allocation = z.infer<typeof allocationSchema>;

/** Wanted for overall accuracy: its standard error, the half-width of its 95 % interval, or simply so many points. */
export const planTargetSchema = z.discriminatedUnion('kind', [
  z
    .object({ kind: z.literal('standard-error'), standardError: z.number().min(0.001, 'At least 0.001.').max(0.25) })
    .strict(),
  z.object({ kind: z.literal('half-width'), halfWidth: z.number().min(0.002, 'At least 0.002.').max(0.5) }).strict(),
  z.object({ kind: z.literal('total'), total: z.number().int().min(2, 'At least two points.').max(20_000) }).strict(),
]);
export type PlanTarget = z.infer<typeof planTargetSchema>;

/** What points are drawn from: the map's classes, how the map differs from another one, or zones. */
export const strataKindSchema = z.union([
  z.literal('map-classes'),
  z.object({ kind: z.literal('from-to'), runId: idSchema }).strict(),
  z.object({ kind: z.literal('zones'), layerId: idSchema }).strict(),
]);

const planFields = {
  runId: idSchema,
  strata: strataKindSchema.default('map-classes'),
  /** Expected user's accuracy by class; a class left out is taken to have `expectedOtherwise`. */
  expected: z
    .array(z.object({ classId: idSchema, users: shareSchema }).strict())
    .max(254)
    .default([]),
  expectedOtherwise: shareSchema.default(0.8),
  target: planTargetSchema,
  allocation: allocationSchema,
};
export const planDesignSchema = z.object(planFields).strict();
export type PlanDesign = z.infer<typeof planDesignSchema>;

export const plannedStratumSchema = z.object({
  /** Null for what the map leaves unclassified, and where strata are no map classes. */
  classId: idSchema.nullable(),
  code: z.number().int(),
  name: z.string(),
  colour: z.string(),
  pixels: z.number().int(),
  areaHa: z.number(),
  share: z.number(),
  /** Null for what the map leaves unclassified, which is never right. */
  expectedUsers: z.number().nullable(),
  points: z.number().int(),
  /** Expected 95 % interval of user's accuracy; null where points are too few or nothing is mapped. */
  expectedLow: z.number().nullable(),
  expectedHigh: z.number().nullable(),
});
export const designPlanSchema = z.object({
  strata: z.array(plannedStratumSchema),
  /** Points in all, after every stratum was given at least two. */
  n: z.number().int(),
  /** What the target alone asks for, with Neyman allocation. */
  nOfTarget: z.number().int(),
  standardError: z.number().nullable(),
  halfWidth: z.number().nullable(),
  /** Precision of overall accuracy against the number of points, under the chosen allocation. */
  curve: z.array(
    z.object({ n: z.number().int(), standardError: z.number().nullable(), halfWidth: z.number().nullable() }),
  ),
  how: z.array(z.string()),
  /** What to think of before drawing. */
  notes: z.array(z.string()),
});
export type DesignPlan = z.infer<typeof designPlanSchema>;

const seedSchema = z.number().int('A seed is a whole number.').min(0).max(4_294_967_295);
export const createDesignSchema = z
  .object({
    ...planFields,
    name: lineSchema(120).default(''),
    seed: seedSchema.optional(),
    /** Least distance between points, metres; 0 is none. */
    minSpacingMeters: z.number().min(0).max(100_000).default(0),
    /** How many people answer each point. */
    answersPerPoint: z.number().int().min(1).max(5).default(2),
  })
  .strict();
export type CreateDesign = z.infer<typeof createDesignSchema>;

/** Makes a draft larger, or from a closed design a larger draft that begins with its points and answers. */
export const augmentDesignSchema = z
  .object({ target: planTargetSchema, allocation: allocationSchema, name: lineSchema(120).optional() })
  .strict();
export type AugmentDesign = z.infer<typeof augmentDesignSchema>;

export const closeDesignSchema = z
  .object({
    /** Close although some points have no settled class; they are left out of the estimates and said. */
    leaveUnsettled: z.boolean().default(false),
  })
  .strict();

/** draft: may be changed · open: frozen, being interpreted · adjudicating: no more answers, disagreements are decided · closed. */
export const designStateSchema = z.enum(['draft', 'open', 'adjudicating', 'closed']);
export type DesignState = z.infer<typeof designStateSchema>;

export const designSchema = z.object({
  id: idSchema,
  projectId: idSchema,
  runId: idSchema,
  runNumber: z.number().int(),
  number: z.number().int(),
  name: z.string(),
  state: designStateSchema,
  n: z.number().int(),
  answersPerPoint: z.number().int(),
  minSpacingMeters: z.number(),
  strataKind: strataKindSchema,
  /** Said where there is a least distance. */
  spacingEffect: z.string().nullable(),
  /** Classes a point may be given: those of the run, then others of the scheme. */
  classes: z.array(referenceClassSchema),
  /** SHA-256 over strata, seed and points, from opening on. */
  digest: z.string().nullable(),
  /** Design this one carries on. */
  augmentsId: idSchema.nullable(),
  /** Withheld (null) from those who may interpret while the design is open or adjudicated. */
  strata: z.array(plannedStratumSchema).nullable(),
  seed: z.number().int().nullable(),
  progress: z.object({
    points: z.number().int(),
    /** Points that have all their answers. */
    complete: z.number().int(),
    /** Points whose class stands: answers agree, or it was decided. */
    settled: z.number().int(),
    /** From adjudication on: points whose answers disagree and that nobody has decided; 0 before. */
    disputed: z.number().int(),
    /** The viewer's own. */
    mine: z.object({ answered: z.number().int(), skipped: z.number().int(), left: z.number().int() }),
  }),
  createdBy: personSchema.nullable(),
  createdAt: instantSchema,
  openedAt: instantSchema.nullable(),
  closedAt: instantSchema.nullable(),
  abilities: z.object({
    change: z.boolean(),
    delete: z.boolean(),
    augment: z.boolean(),
    open: z.boolean(),
    interpret: z.boolean(),
    endInterpretation: z.boolean(),
    adjudicate: z.boolean(),
    close: z.boolean(),
    readEstimates: z.boolean(),
    exportPoints: z.boolean(),
  }),
});
export type Design = z.infer<typeof designSchema>;
export const designListSchema = z.object({
  designs: z.array(designSchema),
  abilities: z.object({ plan: z.boolean() }),
  /** Whether class maps, their areas and their accuracy are kept from the viewer, who is interpreting. */
  mapsWithheld: z.boolean(),
});
export type DesignList = z.infer<typeof designListSchema>;

export const answerSchema = z.object({
  classId: idSchema,
  alternateClassId: idSchema.nullable(),
  confidence: confidenceSchema,
  note: z.string(),
  source: z.enum(['image', 'import']),
  answeredAt: instantSchema,
});
export type ReferenceAnswer = z.infer<typeof answerSchema>;

export const putAnswerSchema = z
  .object({
    classId: idSchema,
    alternateClassId: idSchema.nullable().default(null),
    confidence: confidenceSchema.default('medium'),
    note: textSchema(2_000).default(''),
    /** Seconds the point was looked at, for the pace. */
    seconds: z.number().min(0).max(86_400).optional(),
  })
  .strict()
  .refine(({ classId, alternateClassId }) => classId !== alternateClassId, {
    path: ['alternateClassId'],
    error: 'The alternate is another class than the first choice.',
  });
export type PutAnswer = z.input<typeof putAnswerSchema>;

/** A point as an interpreter sees it: nothing in it tells what the map shows or what others said. */
export const blindPointSchema = z.object({
  id: idSchema,
  designId: idSchema,
  number: z.number().int(),
  /** Centre of the pixel, degrees. */
  position: positionSchema,
  /** Outline of the pixel, and of the 3 × 3 and 5 × 5 pixels around it. */
  outline: polygonSchema,
  outline3: polygonSchema,
  outline5: polygonSchema,
  bounds: boundsSchema,
  /** Scene the map was made from; others may be looked at as well. */
  sceneId: idSchema,
  answer: answerSchema.nullable(),
  skipped: z.boolean(),
  /** Whether the point takes an answer of the viewer now; otherwise why not. */
  takesAnswer: z.boolean(),
  refusal: z.string().nullable(),
  /** Neighbours in the viewer's own random order. */
  place: z.number().int(),
  previousNumber: z.number().int().nullable(),
  nextNumber: z.number().int().nullable(),
  progress: z.object({
    answered: z.number().int(),
    skipped: z.number().int(),
    left: z.number().int(),
    total: z.number().int(),
    /** Median seconds a point of the viewer's; null before the first. */
    secondsPerPoint: z.number().nullable(),
  }),
});
export type BlindPoint = z.infer<typeof blindPointSchema>;
/** `point` is null when the viewer has answered all that is theirs. */
export const nextPointSchema = z.object({
  point: blindPointSchema.nullable(),
  progress: blindPointSchema.shape.progress,
});
export type NextPoint = z.infer<typeof nextPointSchema>;

export const decisionSchema = z.object({
  classId: idSchema,
  alternateClassId: idSchema.nullable(),
  note: z.string(),
  decidedBy: personSchema.nullable(),
  decidedAt: instantSchema,
});
export const putDecisionSchema = z
  .object({
    classId: idSchema,
    alternateClassId: idSchema.nullable().default(null),
    note: textSchema(2_000).default(''),
  })
  .strict()
  .refine(({ classId, alternateClassId }) => classId !== alternateClassId, {
    path: ['alternateClassId'],
    error: 'The alternate is another class than the first choice.',
  });
export type PutDecision = z.input<typeof putDecisionSchema>;

export const disagreementSchema = z.object({
  point: z.object({
    id: idSchema,
    number: z.number().int(),
    position: positionSchema,
    outline: polygonSchema,
    outline3: polygonSchema,
    outline5: polygonSchema,
    bounds: boundsSchema,
    sceneId: idSchema,
  }),
  answers: z.array(answerSchema.extend({ by: personSchema.nullable() })),
  decision: decisionSchema.nullable(),
});
export type Disagreement = z.infer<typeof disagreementSchema>;
export const disagreementListSchema = z.object({
  disagreements: z.array(disagreementSchema),
  undecided: z.number().int(),
});

/** A cell of the matrix: class code the map shows, and reference class. */
export const cellPointsQuerySchema = z.object({ mapped: z.coerce.number().int(), reference: idSchema });
/** Points behind a cell of the matrix of a closed design. */
export const cellPointsSchema = z.object({
  points: z.array(
    disagreementSchema.shape.point.extend({
      settledBy: z.enum(['agreement', 'decision']),
      answers: disagreementSchema.shape.answers,
      note: z.string(),
    }),
  ),
});
export type CellPoint = z.infer<typeof cellPointsSchema>['points'][number];

/** Where the points are, to be found on the ground: nothing of map or answers. */
export const answerSheetSchema = z.object({
  /** Name of the scene's reference system, which easting and northing are in. */
  crsName: z.string(),
  points: z.array(
    z.object({
      number: z.number().int(),
      position: positionSchema,
      /** In the scene's reference system: x and y of the pixel's centre. */
      projected: z.tuple([z.number(), z.number()]),
    }),
  ),
});

/** CSV with a heading: number or lon,lat; class_code or class; optional alternate_code or alternate, confidence, note. */
export const importAnswersSchema = z
  .object({ csv: z.string().min(1, 'The file is empty.').max(6_000_000), dryRun: z.boolean().default(false) })
  .strict();
export const importReportSchema = z.object({
  dryRun: z.boolean(),
  taken: z.number().int(),
  replaced: z.number().int(),
  refused: z.number().int(),
  rows: z.array(
    z.object({
      /** Line of the file, the heading being 1. */
      line: z.number().int(),
      number: z.number().int().nullable(),
      outcome: z.enum(['taken', 'replaced', 'refused']),
      reason: z.string().nullable(),
    }),
  ),
});
export type ImportReport = z.infer<typeof importReportSchema>;
