import { z } from 'zod';
import { BAND_QUANTITIES, BAND_ROLES } from '../constants/bands.ts';
import { daySchema, idSchema, instantSchema, personSchema } from './common.ts';
import { arealGeometrySchema, boundsSchema } from './geometry.ts';
import { jobSchema } from './job.ts';
import { lineSchema } from './text.ts';

export const histogramSchema = z.object({
  /** Lower edge of the first bin and upper edge of the last, in stored values (DN). */
  low: z.number(),
  high: z.number(),
  counts: z.array(z.number().int()),
});
export const bandStatisticsSchema = z.object({
  validPixels: z.number().int(),
  nodataPixels: z.number().int(),
  min: z.number(),
  max: z.number(),
  mean: z.number(),
  standardDeviation: z.number(),
  /** 2nd and 98th percentile of the stored values. */
  p2: z.number(),
  p98: z.number(),
  histogram: histogramSchema,
});
export type BandStatistics = z.infer<typeof bandStatisticsSchema>;

export const bandSchema = z.object({
  id: idSchema,
  /** Place in the scene, from 1. */
  number: z.number().int(),
  name: z.string(),
  role: z.enum(BAND_ROLES),
  centreWavelengthUm: z.number().nullable(),
  gsdMeters: z.number().nullable(),
  /** quantity = stored value × scale + offset. */
  scale: z.number(),
  offset: z.number(),
  quantity: z.enum(BAND_QUANTITIES),
  nodata: z.number().nullable(),
  dataType: z.string(),
  width: z.number().int(),
  height: z.number().int(),
  sha256: z.string(),
  statistics: bandStatisticsSchema,
});
export type Band = z.infer<typeof bandSchema>;

export const sceneStateSchema = z.enum(['ingesting', 'ready', 'failed']);
export const sceneSchema = z.object({
  id: idSchema,
  projectId: idSchema,
  name: z.string(),
  acquiredOn: daySchema.nullable(),
  state: sceneStateSchema,
  /** Why the ingest failed: found, wanted, what to do. */
  failure: z.object({ code: z.string(), found: z.string(), wanted: z.string(), advice: z.string() }).nullable(),
  job: jobSchema.nullable(),
  files: z.array(z.object({ name: z.string(), bytes: z.number(), sha256: z.string() })),
  width: z.number().int().nullable(),
  height: z.number().int().nullable(),
  /** Size of a scene pixel in units of its reference system. */
  pixelWidth: z.number().nullable(),
  pixelHeight: z.number().nullable(),
  crsName: z.string().nullable(),
  crsEpsg: z.number().int().nullable(),
  crsProj4: z.string().nullable(),
  /** Outline; in two parts where the scene lies across the antimeridian, and then west > east in `bounds`. */
  footprint: arealGeometrySchema.nullable(),
  bounds: boundsSchema.nullable(),
  bands: z.array(bandSchema),
  /** Band roles were guessed from the number of bands and nobody has saved the band table since. */
  guessedRoles: z.boolean(),
  /** Changes whenever pixels or band settings change; part of tile addresses so that they cache for long. */
  contentKey: z.string(),
  uploadedBy: personSchema.nullable(),
  createdAt: instantSchema,
  version: z.number().int(),
});
export type Scene = z.infer<typeof sceneSchema>;
export const sceneListSchema = z.object({
  scenes: z.array(sceneSchema),
  /** What one upload may hold. */
  limits: z.object({ fileBytes: z.number().int(), files: z.number().int() }),
});

export const updateSceneSchema = z
  .object({
    version: z.number().int(),
    name: lineSchema(160).min(1, 'Give the scene a name.').optional(),
    acquiredOn: daySchema.nullable().optional(),
    bands: z
      .array(
        z
          .object({
            id: idSchema,
            name: lineSchema(80).min(1, 'Give the band a name.'),
            role: z.enum(BAND_ROLES),
            centreWavelengthUm: z.number().positive('A wavelength is above 0 µm.').max(1000).nullable(),
            gsdMeters: z.number().positive('A ground sample distance is above 0 m.').max(100_000).nullable(),
            scale: z.number().refine((value) => value !== 0, 'A scale of 0 would erase the band.'),
            offset: z.number(),
            quantity: z.enum(BAND_QUANTITIES),
          })
          .strict(),
      )
      .max(64)
      .optional(),
  })
  .strict();
export type UpdateScene = z.infer<typeof updateSceneSchema>;

/** Query of a tile: bands by number in screen order (one or three), stretch as low:high pairs in stored values, gamma. */
export const tileQuerySchema = z.object({
  bands: z
    .string()
    .regex(/^\d{1,2}(,\d{1,2},\d{1,2})?$/, 'bands is one band number, or three joined by commas.')
    .optional(),
  stretch: z
    .string()
    .regex(
      /^-?[\d.e+-]+:-?[\d.e+-]+(,-?[\d.e+-]+:-?[\d.e+-]+){0,2}$/i,
      'stretch is low:high for each band, joined by commas.',
    )
    .optional(),
  gamma: z.coerce.number().min(0.2).max(5).optional(),
  v: z.string().max(80).optional(),
});
export type TileQuery = z.infer<typeof tileQuerySchema>;
export const tileParamsSchema = z.object({
  z: z.coerce.number().int().min(0).max(24),
  x: z.coerce.number().int().min(0),
  y: z.coerce.number().int().min(0),
});

export const probeQuerySchema = z.object({
  lon: z.coerce.number().min(-180).max(180),
  lat: z.coerce.number().min(-90).max(90),
});
export const probeSchema = z.object({
  /** Column and row of the scene pixel, from the upper left; null outside the scene. */
  pixel: z.object({ column: z.number().int(), row: z.number().int() }).nullable(),
  values: z.array(
    z.object({
      bandId: idSchema,
      number: z.number().int(),
      name: z.string(),
      centreWavelengthUm: z.number().nullable(),
      stored: z.number().nullable(),
      value: z.number().nullable(),
      quantity: z.enum(BAND_QUANTITIES),
    }),
  ),
});
export type Probe = z.infer<typeof probeSchema>;
