import { z } from 'zod';
import { idSchema, instantSchema, personSchema } from './common.ts';
import { drawingSchema, polygonSchema } from './geometry.ts';
import { lineSchema } from './text.ts';

/** Open: nobody began. In work: someone drew in it. Done: all who work in it say so. Checked: the lead looked. */
export const blockStateSchema = z.enum(['open', 'in-work', 'done', 'checked']);
export type BlockState = z.infer<typeof blockStateSchema>;

export const blockAssignmentSchema = z.object({
  person: personSchema,
  doneAt: instantSchema.nullable(),
  /** Their own samples in the block. */
  samples: z.number().int(),
  submitted: z.number().int(),
  accepted: z.number().int(),
  returned: z.number().int(),
  /** Classes of which they drew the target; null without a target. */
  classesReached: z.number().int().nullable(),
});

export const blockSchema = z.object({
  id: idSchema,
  projectId: idSchema,
  number: z.number().int(),
  name: z.string(),
  geometry: polygonSchema,
  areaHa: z.number(),
  targetPerClass: z.number().int().nullable(),
  state: blockStateSchema,
  assignments: z.array(blockAssignmentSchema),
  /** Samples of everybody whose centre lies in the block. */
  sampleCount: z.number().int(),
  /** Two people label it independently and are not both done: each sees their own samples only. */
  isIndependent: z.boolean(),
  version: z.number().int(),
  abilities: z.object({ finish: z.boolean(), reopen: z.boolean(), check: z.boolean() }),
});
export type Block = z.infer<typeof blockSchema>;
export const blockListSchema = z.object({
  blocks: z.array(blockSchema),
  nClasses: z.number().int(),
  abilities: z.object({ manage: z.boolean() }),
});
export type BlockList = z.infer<typeof blockListSchema>;

const targetSchema = z.number().int().min(1).max(1_000).nullable();
export const MIN_BLOCK_METERS = 100;
export const MAX_BLOCKS = 400;
export const cutBlocksSchema = z
  .object({
    sizeMeters: z.number().min(MIN_BLOCK_METERS, `A block is at least ${MIN_BLOCK_METERS} m wide.`).max(500_000),
    targetPerClass: targetSchema.default(null),
    /** Removes the blocks there are, with their assignments; samples stay. */
    replace: z.boolean().default(false),
  })
  .strict();
export type CutBlocks = z.input<typeof cutBlocksSchema>;
export const drawBlockSchema = z
  .object({
    name: lineSchema(40).min(1, 'Give the block a name.'),
    geometry: drawingSchema,
    targetPerClass: targetSchema.default(null),
  })
  .strict();
export type DrawBlock = z.input<typeof drawBlockSchema>;
export const updateBlockSchema = z
  .object({
    version: z.number().int(),
    name: lineSchema(40).min(1, 'Give the block a name.').optional(),
    targetPerClass: targetSchema.optional(),
  })
  .strict();
export type UpdateBlock = z.infer<typeof updateBlockSchema>;
/** Gives blocks to nobody, to one labeller, or to two who label independently of each other. */
export const assignBlocksSchema = z
  .object({
    blockIds: z.array(idSchema).min(1, 'Choose at least one block.').max(MAX_BLOCKS),
    userIds: z.array(idSchema).max(2, 'A block has one labeller, or two.'),
    targetPerClass: targetSchema.optional(),
  })
  .strict();
export type AssignBlocks = z.infer<typeof assignBlocksSchema>;
export const moveBlockSchema = z.object({ to: z.enum(['done', 'in-work', 'checked', 'unchecked']) }).strict();
export type BlockMove = z.infer<typeof moveBlockSchema>['to'];

/** Samples of the two that share pixels and differ in class. */
export const blockDisagreementSchema = z.object({
  firstSampleId: idSchema,
  secondSampleId: idSchema,
  pixels: z.number().int(),
});
export const blockAgreementSchema = z.object({
  people: z.array(personSchema).length(2),
  /** Pixels that samples of both cover, each counted once for each of the two. */
  pixelsOfBoth: z.number().int(),
  pixelsOfFirstOnly: z.number().int(),
  pixelsOfSecondOnly: z.number().int(),
  agreeing: z.number().int(),
  rawAgreement: z.number().nullable(),
  cohenKappa: z.number().nullable(),
  fleissKappa: z.number().nullable(),
  /** Pixels by class of the first (rows) and of the second (columns), in the order of `classIds`. */
  classIds: z.array(idSchema),
  matrix: z.array(z.array(z.number().int())),
  disagreements: z.array(blockDisagreementSchema),
});
export type BlockAgreement = z.infer<typeof blockAgreementSchema>;
/** Keeps one of two samples that differ; the other leaves the map, and its history can bring it back. */
export const settleBlockSchema = z
  .object({
    keep: z.object({ id: idSchema, version: z.number().int() }).strict(),
    drop: z.object({ id: idSchema, version: z.number().int() }).strict(),
  })
  .strict();
export type SettleBlock = z.infer<typeof settleBlockSchema>;
