import { In, IsNull } from 'typeorm';
import type { AccuracyUnit, CellSamples } from '../../shared/contracts/accuracy.ts';
import type { App } from '../app-context.ts';
import { RunSample } from '../entities/run-sample.ts';
import type { Run } from '../entities/run.ts';
import { Sample } from '../entities/sample.ts';
import { InvalidInput, NotFound } from '../errors.ts';
import { countHeldOut, measureAccuracy, type HeldOutPolygon } from './accuracy-figures.ts';

/** @throws NotFound when the run has no class map (yet) */
export function requireResult(run: Run): NonNullable<Run['result']> {
  if (!run.result) throw new NotFound(`Run ${run.number} has no class map: it is ${run.job.state}.`);
  return run.result;
}

interface HeldOutRow extends HeldOutPolygon {
  number: number;
}

async function loadHeldOut(app: App, run: Run): Promise<HeldOutRow[]> {
  requireResult(run);
  const rows = await app.db
    .getRepository(RunSample)
    .find({ where: { runId: run.id, part: 'held-out' }, order: { sampleNumber: 'ASC' } });
  return rows.map(({ sampleId, sampleNumber, classId, mappedPixels }) => ({
    id: sampleId,
    number: sampleNumber,
    classIndex: run.classes.findIndex(({ id }) => id === classId),
    mappedPixels: mappedPixels ?? {},
  }));
}

/** Accuracy figures of a finished run. @throws NotFound when it has no class map */
export async function readAccuracy(app: App, run: Run, unit: AccuracyUnit) {
  return measureAccuracy(await loadHeldOut(app, run), run.classes, unit);
}

/** The held-out samples behind a cell of the confusion matrix, most pixels first. @throws InvalidInput for a class not of the run */
export async function findCellSamples(
  app: App,
  run: Run,
  unit: AccuracyUnit,
  cell: { mapped: string; reference: string },
): Promise<CellSamples> {
  const heldOut = await loadHeldOut(app, run);
  const mapped = findClass(run, 'mapped', cell.mapped);
  const reference = findClass(run, 'reference', cell.reference);
  const { polygons } = countHeldOut(heldOut, run.classes, unit);
  const behind = heldOut.flatMap(({ id, number }, i) => {
    const polygon = polygons[i];
    if (polygon?.referenceClass !== reference) return [];
    const pixels = polygon.mappedCounts[mapped] ?? 0;
    if (unit === 'pixel' ? pixels === 0 : polygon.majority !== mapped) return [];
    return [{ id, number, pixels, pixelsOfSample: polygon.mappedCounts.reduce((sum, n) => sum + n, polygon.unmapped) }];
  });
  const there = await app.db
    .getRepository(Sample)
    .find({ where: { id: In(behind.map(({ id }) => id)), deletedAt: IsNull() }, select: { id: true } });
  const idsThere = new Set(there.map(({ id }) => id));
  return {
    samples: behind
      .sort((a, b) => b.pixels - a.pixels || a.number - b.number)
      .map(({ id, ...row }) => ({ sampleId: id, ...row, stillThere: idsThere.has(id) })),
  };
}

function findClass(run: Run, path: string, classId: string): number {
  const index = run.classes.findIndex(({ id }) => id === classId);
  if (index >= 0) return index;
  throw new InvalidInput('The cell is not in this run’s matrix.', {
    errors: [{ path, message: 'This class is not one of the run’s.' }],
  });
}
