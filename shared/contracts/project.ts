import { z } from 'zod';
import { PROJECT_ROLES } from '../constants/roles.ts';
import { emailSchema, idSchema, instantSchema, personSchema } from './common.ts';
import { arealGeometrySchema, boundsSchema, studyAreaSchema } from './geometry.ts';
import { lineSchema, textSchema } from './text.ts';

export const projectRoleSchema = z.enum(PROJECT_ROLES);

/** What the viewer may do here, decided on the server; the client never derives it again. */
export const projectAbilitiesSchema = z.object({
  manageProject: z.boolean(),
  manageMembers: z.boolean(),
  readScenes: z.boolean(),
  manageScenes: z.boolean(),
  readClasses: z.boolean(),
  manageClasses: z.boolean(),
  readSamples: z.boolean(),
  drawSamples: z.boolean(),
  readRuns: z.boolean(),
  startRuns: z.boolean(),
  readAccuracy: z.boolean(),
});
export type ProjectAbilities = z.infer<typeof projectAbilitiesSchema>;

export const stageStateSchema = z.enum(['empty', 'part', 'done']);
export const stageSchema = z.object({
  id: z.enum(['overview', 'scenes', 'classes', 'samples', 'runs', 'accuracy', 'handover']),
  state: stageStateSchema,
  count: z.number().int().nullable(),
});
export type Stage = z.infer<typeof stageSchema>;

export const projectSummarySchema = z.object({
  id: idSchema,
  name: z.string(),
  client: z.string(),
  description: z.string(),
  roles: z.array(projectRoleSchema),
  createdAt: instantSchema,
  updatedAt: instantSchema,
});
export type ProjectSummary = z.infer<typeof projectSummarySchema>;
export const projectListSchema = z.object({ projects: z.array(projectSummarySchema) });

export const projectSchema = projectSummarySchema.extend({
  studyArea: arealGeometrySchema.nullable(),
  studyAreaBounds: boundsSchema.nullable(),
  targetOverallAccuracy: z.number().min(0).max(1).nullable(),
  targetSamplesPerClass: z.number().int().min(1).nullable(),
  stages: z.array(stageSchema),
  abilities: projectAbilitiesSchema,
  version: z.number().int(),
});
export type Project = z.infer<typeof projectSchema>;

export const createProjectSchema = z
  .object({
    name: lineSchema(120).min(1, 'Give the project a name.'),
    client: lineSchema(160).default(''),
    description: textSchema(4_000).default(''),
  })
  .strict();
export type CreateProject = z.input<typeof createProjectSchema>;

export const updateProjectSchema = z
  .object({
    version: z.number().int(),
    name: lineSchema(120).min(1, 'Give the project a name.').optional(),
    client: lineSchema(160).optional(),
    description: textSchema(4_000).optional(),
    targetOverallAccuracy: z.number().min(0).max(1).nullable().optional(),
    targetSamplesPerClass: z.number().int().min(1).max(100_000).nullable().optional(),
  })
  .strict();

/** The name typed again, as a guard against loss. */
export const deleteProjectSchema = z.object({ confirmName: z.string() }).strict();

export const setStudyAreaSchema = z
  .object({ geometry: studyAreaSchema.nullable(), version: z.number().int() })
  .strict();

export const memberSchema = z.object({
  id: idSchema,
  person: personSchema,
  email: z.string(),
  roles: z.array(projectRoleSchema),
  invited: z.boolean(),
  sampleCount: z.number().int(),
  addedAt: instantSchema,
});
export type Member = z.infer<typeof memberSchema>;
export const memberListSchema = z.object({ members: z.array(memberSchema) });
export const addMemberSchema = z
  .object({ email: emailSchema, roles: z.array(projectRoleSchema).min(1, 'Choose at least one role.').max(5) })
  .strict();
export const addMemberResultSchema = z.object({
  member: memberSchema,
  mailed: z.boolean(),
  link: z.string().nullable(),
});
export const updateMemberSchema = z
  .object({ roles: z.array(projectRoleSchema).min(1, 'Choose at least one role.').max(5) })
  .strict();

/** One line of recent activity. */
export const activitySchema = z.object({
  id: z.string(),
  at: instantSchema,
  who: z.string().nullable(),
  text: z.string(),
  path: z.string().nullable(),
});
export const overviewSchema = z.object({
  waiting: z.array(z.object({ text: z.string(), path: z.string() })),
  figures: z.object({
    sceneCount: z.number().int(),
    sampleCount: z.number().int(),
    samplesPerClass: z.array(
      z.object({
        classId: idSchema,
        name: z.string(),
        colour: z.string(),
        code: z.number().int(),
        samples: z.number().int(),
        pixels: z.number().int(),
      }),
    ),
    bestRun: z
      .object({
        id: idSchema,
        number: z.number().int(),
        overallAccuracy: z.number().nullable(),
        low: z.number().nullable(),
        high: z.number().nullable(),
      })
      .nullable(),
  }),
  activity: z.array(activitySchema),
});
export type Overview = z.infer<typeof overviewSchema>;
