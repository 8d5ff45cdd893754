import { createHash } from 'node:crypto';
import type { App } from '../app-context.ts';
import { ReferenceDesign } from '../entities/reference-design.ts';
import { ReferencePoint } from '../entities/reference-point.ts';
import { Conflict } from '../errors.ts';
import { requireResult } from './accuracy.ts';
import { recordActivity } from './activities.ts';
import { loadAnsweredPoints } from './design-settle.ts';
import { announceDesign, lockDesign } from './designs.ts';
import { findPlannedRun } from './planned-run.ts';

/** Freezes a draft and opens it to interpretation. @throws Conflict "design-frozen" when it is no draft */
export async function openDesign(app: App, design: ReferenceDesign, byId: string): Promise<ReferenceDesign> {
  const run = await findPlannedRun(app, design.projectId, design.runId);
  await app.db.transaction(async (manager) => {
    const draft = await lockDesign(manager, design.id, ['draft'], 'design-frozen', 'The design was opened already.');
    const points = await manager.find(ReferencePoint, { where: { designId: design.id }, order: { number: 'ASC' } });
    const digest = digestDesign(requireResult(run).classMapSha256, draft, points);
    await manager.update(ReferenceDesign, { id: design.id }, { state: 'open', digest, openedAt: new Date() });
    await recordActivity(manager, design.projectId, byId, `opened reference design ${design.number}`, 'accuracy');
  });
  return announceDesign(app, design.projectId, design.id, byId);
}

/** SHA-256 over all that the estimates' probabilities rest on: class map, strata, seed, distance, and every point. */
function digestDesign(
  classMapSha256: string,
  { strata, seed, minSpacingMeters }: Pick<ReferenceDesign, 'strata' | 'seed' | 'minSpacingMeters'>,
  points: readonly Pick<
    ReferencePoint,
    'number' | 'stratum' | 'drawOrder' | 'pixelRow' | 'pixelColumn' | 'mappedCode'
  >[],
): string {
  const content = {
    classMapSha256,
    seed,
    minSpacingMeters,
    strata: strata.map(({ code, pixels, areaHa, points: n }) => [code, pixels, areaHa, n]),
    points: points.map(({ number, stratum, drawOrder, pixelRow, pixelColumn, mappedCode }) => [
      ...[number, stratum, drawOrder, pixelRow, pixelColumn, mappedCode],
    ]),
  };
  return createHash('sha256').update(JSON.stringify(content)).digest('hex');
}

/** Ends interpretation: no more answers are taken, and those given may be compared. @throws Conflict "not-open" */
export async function endInterpretation(app: App, design: ReferenceDesign, byId: string): Promise<ReferenceDesign> {
  await app.db.transaction(async (manager) => {
    await lockDesign(manager, design.id, ['open'], 'not-open', 'The design is not being interpreted.');
    await manager.update(ReferenceDesign, { id: design.id }, { state: 'adjudicating' });
    await recordActivity(
      ...([
        manager,
        design.projectId,
        byId,
        `ended interpretation of reference design ${design.number}`,
        'accuracy',
      ] as const),
    );
  });
  return announceDesign(app, design.projectId, design.id, byId);
}

/** Closes an adjudicated design. @throws Conflict "unsettled-points" unless they may be left, "still-interpreting" before */
export async function closeDesign(
  app: App,
  design: ReferenceDesign,
  byId: string,
  { leaveUnsettled }: { leaveUnsettled: boolean },
): Promise<ReferenceDesign> {
  await app.db.transaction(async (manager) => {
    await lockDesign(
      ...([manager, design.id, ['adjudicating'], 'still-interpreting'] as const),
      'Only a design whose interpretation has ended can be closed.',
    );
    const unsettled = (await loadAnsweredPoints(app, design.id)).filter(({ settled }) => settled === null);
    if (unsettled.length > 0 && !leaveUnsettled) {
      throw new Conflict(
        'Some points have no settled class.',
        {
          found: `${unsettled.length} points are disputed or unanswered`,
          advice: 'Decide them, or close and leave them out of the estimates.',
        },
        'unsettled-points',
      );
    }
    await manager.update(ReferenceDesign, { id: design.id }, { state: 'closed', closedAt: new Date() });
    await recordActivity(manager, design.projectId, byId, `closed reference design ${design.number}`, 'accuracy');
  });
  return announceDesign(app, design.projectId, design.id, byId);
}
