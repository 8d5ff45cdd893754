import type { RunComparison, RunMcNemar } from '../../shared/contracts/run-comparison.ts';
import { compareByMcNemar } from '../analysis/accuracy/mcnemar.ts';
import type { App } from '../app-context.ts';
import { RunSample } from '../entities/run-sample.ts';
import type { Run } from '../entities/run.ts';
import { InvalidInput, NotFound } from '../errors.ts';
import { runComputeTask } from '../jobs/compute/run-compute-task.ts';
import type { RunPolygon } from '../jobs/compute/tasks.ts';
import type { ComparedCodes } from '../raster/compare-codes.ts';
import { requireResult } from './accuracy.ts';
import { haveSamePixels } from './map-pixels.ts';
import { measurePixelAreas } from './run-areas.ts';
import { drawInPixels, placeScene } from './run-scene.ts';
import { findRun } from './runs.ts';

const M2_PER_HECTARE = 10_000;
const CAUTIONS = {
  counting:
    'Areas are counts of map pixels. They carry the errors of both maps; where the maps err more one way than the other, the counted change is biased. Areas of change to rely on come from a reference sample (Olofsson et al. 2014, Remote Sensing of Environment 148:42–57).',
  change:
    'The maps are of different scenes: what differs is change on the ground together with the errors of both maps, and errors can outnumber real change.',
  pixels:
    'Pixels of one polygon are alike, so McNemar’s test by pixel takes chance for difference: its p is too small. The version by polygon counts each polygon once and is the one to quote.',
};

/**
 * Lays the maps of two runs over each other.
 * @throws InvalidInput when they are one run, or their maps have different pixels; NotFound when one has no map
 */
export async function compareTwoRuns(
  app: App,
  projectId: string,
  ids: { first: string; second: string },
): Promise<RunComparison> {
  const refuse = (message: string) =>
    new InvalidInput(message, { errors: [{ path: 'second', message }] }, 'not-comparable');
  if (ids.first === ids.second) throw refuse('Both are the same run; choose another to compare it with.');
  const [first, second] = [await load(app, projectId, ids.first), await load(app, projectId, ids.second)];
  const placed = placeScene(first.scene);
  if (!placed || !haveSamePixels(first, second)) {
    throw refuse(
      `The maps have different pixels: run ${first.number} lies on the grid of ${first.scene.name}, run ${second.number} on that of ${second.scene.name}. Compare runs of scenes on one grid.`,
    );
  }
  const shared = await findSharedHeldOut(app, first, second);
  const heldOut = shared.flatMap(({ sample, index, codes }): (RunPolygon & { codes: [number, number] })[] => {
    const polygon = drawInPixels(placed, sample.geometry);
    return polygon ? [{ id: sample.sampleId, classIndex: index, polygon, codes }] : [];
  });
  const mapPaths = [
    await app.files.localPath(requireResult(first).mapKey),
    await app.files.localPath(requireResult(second).mapKey),
  ] as const;
  const compared = await runComputeTask(
    app.workers.compute,
    'compare-maps',
    {
      ...{ grid: placed.grid, mapPaths, rowAreaM2: measurePixelAreas(placed).rowAreaM2 },
      heldOut: heldOut.map(({ id, classIndex, polygon }) => ({ id, classIndex, polygon })),
      rightCodes: heldOut.map(({ codes }) => codes),
    },
    AbortSignal.timeout(300_000),
  );
  return present(first, second, compared);
}

async function load(app: App, projectId: string, id: string): Promise<Run> {
  const run = await findRun(app, id);
  if (run?.projectId !== projectId) throw new NotFound();
  requireResult(run);
  return run;
}

/** Samples neither run has learned from, in the same shape and class. */
async function findSharedHeldOut(app: App, first: Run, second: Run) {
  const rows = app.db.getRepository(RunSample);
  const [ofFirst, ofSecond] = [
    await rows.find({ where: { runId: first.id, part: 'held-out' }, order: { sampleNumber: 'ASC' } }),
    await rows.find({ where: { runId: second.id, part: 'held-out' } }),
  ];
  return ofFirst.flatMap((sample) => {
    const twin = ofSecond.find(
      ({ sampleId, sampleVersion }) => sampleId === sample.sampleId && sampleVersion === sample.sampleVersion,
    );
    const index = first.classes.findIndex(({ id }) => id === sample.classId);
    const other = second.classes.find(({ id }) => id === twin?.classId);
    const own = first.classes[index];
    return twin && own && other ? [{ sample, index, codes: [own.code, other.code] as [number, number] }] : [];
  });
}

function present(first: Run, second: Run, { pairs, byPolygon }: ComparedCodes): RunComparison {
  const idOf = (run: Run, code: number) => run.classes.find((one) => one.code === code)?.id ?? null;
  const merged = new Map<string, RunComparison['transitions'][number]>();
  for (const { from, to, pixels, areaM2 } of pairs) {
    const [fromClassId, toClassId] = [idOf(first, from), idOf(second, to)];
    if (fromClassId === null && toClassId === null) continue;
    const key = `${fromClassId} ${toClassId}`;
    const sum = merged.get(key) ?? { fromClassId, toClassId, pixels: 0, areaHa: 0 };
    merged.set(key, { ...sum, pixels: sum.pixels + pixels, areaHa: sum.areaHa + areaM2 / M2_PER_HECTARE });
  }
  const transitions = [...merged.values()].sort((a, b) => b.pixels - a.pixels);
  const onBoth = transitions.filter(({ fromClassId, toClassId }) => fromClassId !== null && toClassId !== null);
  const sumHa = (list: typeof transitions) => list.reduce((sum, { areaHa }) => sum + areaHa, 0);
  const total = sumHa(onBoth);
  const isOneScene = first.sceneId === second.sceneId;
  const known = new Map([...second.classes, ...first.classes].map((one) => [one.id, one]));
  const order = [...new Set([...first.classes, ...second.classes].map(({ id }) => id))];
  return {
    first: describe(first),
    second: describe(second),
    isOneScene,
    classes: order.flatMap((id) => {
      const found = known.get(id);
      return found ? [{ id, name: found.name, colour: found.colour }] : [];
    }),
    transitions,
    agreeingShare: total > 0 ? sumHa(onBoth.filter((one) => one.fromClassId === one.toClassId)) / total : null,
    heldOut: byPolygon.length === 0 ? null : judge(byPolygon),
    cautions: [
      ...(isOneScene ? [] : [CAUTIONS.change]),
      CAUTIONS.counting,
      ...(byPolygon.length === 0 ? [] : [CAUTIONS.pixels]),
    ],
  };
}

function describe({ id, number, name, scene }: Run): RunComparison['first'] {
  return { id, number, name, sceneName: scene.name, acquiredOn: scene.acquiredOn };
}

/** By pixel, and with each polygon once: right where more than half of its pixels are. */
function judge(byPolygon: ComparedCodes['byPolygon']): NonNullable<RunComparison['heldOut']> {
  const pixels = [0, 0, 0, 0];
  const polygons = [0, 0, 0, 0];
  for (const counts of byPolygon) {
    counts.forEach((n, place) => (pixels[place] = (pixels[place] ?? 0) + n));
    const [both, onlyFirst, onlySecond, neither] = counts;
    const n = both + onlyFirst + onlySecond + neither;
    if (n === 0) continue;
    const place = (2 * (both + onlyFirst) > n ? 0 : 2) + (2 * (both + onlySecond) > n ? 0 : 1);
    polygons[place] = (polygons[place] ?? 0) + 1;
  }
  return { polygons: byPolygon.length, byPixel: test(pixels), byPolygon: test(polygons) };
}

function test([bothRight = 0, onlyFirstRight = 0, onlySecondRight = 0, bothWrong = 0]: number[]): RunMcNemar {
  const result = compareByMcNemar(onlyFirstRight, onlySecondRight);
  return {
    n: bothRight + onlyFirstRight + onlySecondRight + bothWrong,
    ...{ bothRight, onlyFirstRight, onlySecondRight, bothWrong },
    chiSquare: result?.chiSquare ?? null,
    pValue: result ? (result.quoted === 'exact' ? result.exactPValue : result.pValue) : null,
    quoted: result?.quoted ?? null,
  };
}
