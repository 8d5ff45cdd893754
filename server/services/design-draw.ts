import { createPointFinder, type DrawnPoint, type DrawStratum } from '../analysis/sampling/draw-points.ts';
import { keepSpacing, SPACING_EFFECT } from '../analysis/sampling/keep-spacing.ts';
import type { DesignStratum } from '../entities/reference-design.ts';
import type { Run } from '../entities/run.ts';
import { InvalidInput, NotFound } from '../errors.ts';
import type { ReadStrata } from './design-strata.ts';
import { placeScene } from './run-scene.ts';

const STRIP_ROWS = 256;
const M2_PER_HECTARE = 10_000;

export interface DesignDraw {
  points: DrawnPoint[];
  /** Candidates left out for lying too near to another point, by stratum. */
  leftOut: number[];
}

/** What a least distance does to the estimates; null without one. */
export function describeSpacing(minSpacingMeters: number): string | null {
  return minSpacingMeters > 0 ? SPACING_EFFECT : null;
}

/** Streams of random numbers hang on the code, so that a stratum's draw does not change with the others. */
function toDrawStrata(strata: readonly DesignStratum[]): DrawStratum[] {
  return strata.map(({ code }) => ({ code, key: `code ${code}` }));
}

/**
 * Draws each stratum's points at random without replacement from the raster of strata, reading it in strips. `existing` points
 * are kept, and a larger draw with the same seed begins with the smaller one's.
 * @throws InvalidInput "spacing-too-large" when a stratum runs out of pixels far enough apart
 */
export async function drawDesign(
  run: Run,
  { strata, read }: { strata: readonly DesignStratum[]; read: ReadStrata },
  { seed, minSpacingMeters, existing = [] }: { seed: number; minSpacingMeters: number; existing?: DrawnPoint[] },
): Promise<DesignDraw> {
  const sizes = strata.map(({ pixels }) => pixels);
  const wanted = strata.map(({ points }) => points);
  const spacing = minSpacingMeters / Math.sqrt(meanPixelAreaM2(strata));
  // Without a distance every candidate is kept, so that as many are drawn as are wanted.
  let candidates = wanted.map((n, h) => (spacing > 0 ? Math.min(sizes[h] ?? 0, n * 2 + 20) : n));
  for (;;) {
    const drawn = await findPoints(run, { strata, read }, candidates, seed);
    const { kept, nTooNear, nLacking } = keepSpacing(drawn, wanted, spacing, existing);
    if (nLacking.every((n) => n === 0)) return { points: kept, leftOut: nTooNear };
    const empty = strata.filter((_, h) => (nLacking[h] ?? 0) > 0 && (candidates[h] ?? 0) >= (sizes[h] ?? 0));
    if (empty.length > 0) {
      throw new InvalidInput(
        'There is no room for so many points at this distance.',
        {
          found: `no more pixels at least ${minSpacingMeters} m from the others in ${empty.map(({ name }) => name).join(', ')}`,
          advice: 'Ask for a smaller distance, or for fewer points.',
          errors: [{ path: 'minSpacingMeters', message: 'There is no room for so many points at this distance.' }],
        },
        'spacing-too-large',
      );
    }
    candidates = candidates.map((n, h) => Math.min(sizes[h] ?? 0, (nLacking[h] ?? 0) > 0 ? n * 4 : n));
  }
}

function meanPixelAreaM2(strata: readonly DesignStratum[]): number {
  const areaHa = strata.reduce((sum, stratum) => sum + stratum.areaHa, 0);
  return (areaHa * M2_PER_HECTARE) / strata.reduce((sum, { pixels }) => sum + pixels, 0);
}

async function findPoints(
  run: Run,
  { strata, read }: { strata: readonly DesignStratum[]; read: ReadStrata },
  wanted: readonly number[],
  seed: number,
): Promise<DrawnPoint[]> {
  const placed = placeScene(run.scene);
  if (!placed) throw new NotFound();
  const { width, height } = placed.grid;
  const finder = createPointFinder(
    toDrawStrata(strata),
    strata.map(({ pixels }) => pixels),
    wanted,
    seed,
  );
  for (let firstRow = 0; firstRow < height; firstRow += STRIP_ROWS) {
    const rows = Math.min(STRIP_ROWS, height - firstRow);
    finder.addStrip({ firstRow, width, codes: await read(firstRow, rows) });
  }
  return finder.points();
}
