import { classPaletteStep } from '../../shared/constants/class-palette.ts';
import { NODATA_CODE, UNCLASSIFIED_CODE } from '../../shared/constants/class-codes.ts';
import type { PlanDesign } from '../../shared/contracts/reference.ts';
import type { App } from '../app-context.ts';
import type { DesignStratum } from '../entities/reference-design.ts';
import type { Run } from '../entities/run.ts';
import { InvalidInput, NotFound } from '../errors.ts';
import { requireResult } from './accuracy.ts';
import { rasteriseZones } from './design-zone-raster.ts';
import { haveSamePixels } from './map-pixels.ts';
import { measurePixelAreas } from './run-areas.ts';
import { placeScene } from './run-scene.ts';
import { findPlannedRun } from './planned-run.ts';
import { requireZoneLayer } from './zone-layers.ts';

const M2_PER_HA = 10_000;
const STRIP_ROWS = 256;
const UNCLASSIFIED = { name: 'Unclassified', colour: '#808080' };
const ELSEWHERE = { name: 'Outside the zones', colour: '#808080' };
/** Changes of a smaller share of the map are gathered: a stratum of its own for each would take two points and tell nothing. */
const RARE_CHANGE = 0.005;

export type PlainStratum = Omit<DesignStratum, 'points' | 'expectedLow' | 'expectedHigh'>;

/** A rows' worth of stratum codes; other codes than those of the strata are outside. */
export type ReadStrata = (firstRow: number, rows: number) => Promise<ArrayLike<number>>;

export interface OpenStrata {
  strata: PlainStratum[];
  read: ReadStrata;
}

type Expectations = Pick<PlanDesign, 'expected' | 'expectedOtherwise'>;

/**
 * The strata of a plan, with the pixels and the area of each, and a way to read which pixel is in which. Pixels without data on
 * the run's map or outside the study area are no part of the population.
 * @throws InvalidInput for a class, run or layer that does not fit
 */
export async function openStrata(
  app: App,
  run: Run,
  plan: Omit<PlanDesign, 'target' | 'allocation'>,
): Promise<OpenStrata> {
  const kind = plan.strata;
  if (kind === 'map-classes') return { strata: listClassStrata(run, plan), read: await readerOf(app, run) };
  if (kind.kind === 'zones') return openZones(app, run, kind.layerId, plan);
  return openChanges(app, run, kind.runId, plan);
}

/** One stratum for each class that is on the map, and one for what the map leaves unclassified. */
function listClassStrata(run: Run, input: Expectations): PlainStratum[] {
  const { pixelsByCode, areaHaByCode } = requireResult(run);
  const unknown = input.expected.findIndex(({ classId }) => !run.classes.some(({ id }) => id === classId));
  if (unknown >= 0) {
    throw new InvalidInput('The plan names a class that is not on the map.', {
      errors: [{ path: `expected.${unknown}.classId`, message: 'This class is not one of the run’s.' }],
    });
  }
  const described = [
    ...run.classes.map(({ id, code, name, colour }) => ({
      ...{ classId: id, code, name, colour },
      expectedUsers: input.expected.find(({ classId }) => classId === id)?.users ?? input.expectedOtherwise,
    })),
    { classId: null, code: UNCLASSIFIED_CODE, ...UNCLASSIFIED, expectedUsers: null },
  ];
  return withShares(
    described
      .filter(({ code }) => code !== NODATA_CODE && (pixelsByCode[code] ?? 0) > 0)
      .map((stratum) => ({
        ...stratum,
        pixels: pixelsByCode[stratum.code] ?? 0,
        areaHa: areaHaByCode[stratum.code] ?? 0,
      })),
  );
}

function withShares(present: Omit<PlainStratum, 'share'>[]): PlainStratum[] {
  if (present.length === 0) throw new InvalidInput('The class map holds no pixel that a point could be drawn from.');
  const totalHa = present.reduce((sum, { areaHa }) => sum + areaHa, 0);
  return present.map((stratum) => ({ ...stratum, share: stratum.areaHa / totalHa }));
}

async function readerOf(app: App, run: Run): Promise<ReadStrata> {
  const band = await app.bands.open(await app.files.localPath(requireResult(run).mapKey));
  const { width } = band.grid;
  // The whole map goes by once; its blocks would push others out of the cache.
  return (firstRow, rows) => band.readWindow(0, 0, firstRow, width, rows, { keep: false });
}

/** Zones as strata: code 1 and up in the layer's order, 0 for what lies outside all of them. */
async function openZones(app: App, run: Run, layerId: string, plan: Expectations): Promise<OpenStrata> {
  const layer = await requireZoneLayer(app, run.projectId, layerId);
  const placed = placeScene(run.scene);
  if (!placed) throw new NotFound();
  const zoneOf = rasteriseZones(placed, layer.zones);
  const map = await readerOf(app, run);
  const { width } = placed.grid;
  const read: ReadStrata = async (firstRow, rows) => {
    const codes = await map(firstRow, rows);
    return Uint16Array.from({ length: rows * width }, (_, i) =>
      codes[i] === NODATA_CODE ? OUTSIDE : (zoneOf[firstRow * width + i] ?? 0),
    );
  };
  const described = [
    ...layer.zones.map(({ name }, place) => ({ code: place + 1, name, colour: classPaletteStep(place % 10).colour })),
    { code: 0, ...ELSEWHERE },
  ];
  return { strata: withShares(await countStrata(run, read, described, plan.expectedOtherwise)), read };
}

/** Outside the population; no stratum has this code. */
const OUTSIDE = 65_535;
const OTHER_CHANGES = 65_534;

/** How the run's map differs from an earlier one of the same pixels: what stays, class by class, and each change that is common. */
async function openChanges(app: App, run: Run, fromRunId: string, plan: Expectations): Promise<OpenStrata> {
  const from = await findPlannedRun(app, run.projectId, fromRunId);
  const refuse = (message: string) => new InvalidInput(message, { errors: [{ path: 'strata.runId', message }] });
  if (from.id === run.id) throw refuse('A map does not differ from itself; choose another run.');
  if (!haveSamePixels(from, run))
    throw refuse('The two maps have different pixels, so they cannot be laid over each other.');
  const [readFrom, readTo] = [await readerOf(app, from), await readerOf(app, run)];
  const placed = placeScene(run.scene);
  if (!placed) throw new NotFound();
  const { width, height } = placed.grid;
  const readPairs = async (firstRow: number, rows: number): Promise<Uint16Array> => {
    const [before, after] = [await readFrom(firstRow, rows), await readTo(firstRow, rows)];
    return Uint16Array.from({ length: rows * width }, (_, i) =>
      before[i] === NODATA_CODE || after[i] === NODATA_CODE ? OUTSIDE : (before[i] ?? 0) * 256 + (after[i] ?? 0),
    );
  };
  const counts = new Map<number, number>();
  let total = 0;
  for (let row = 0; row < height; row += STRIP_ROWS) {
    for (const code of await readPairs(row, Math.min(STRIP_ROWS, height - row))) {
      if (code === OUTSIDE) continue;
      counts.set(code, (counts.get(code) ?? 0) + 1);
      total++;
    }
  }
  const isOwn = (code: number) => {
    const [before, after] = pairOf(from, run, code);
    return before?.id === after?.id || (counts.get(code) ?? 0) >= RARE_CHANGE * total;
  };
  const own = [...counts.keys()].filter(isOwn).sort((a, b) => a - b);
  const known = new Set(own);
  const read: ReadStrata = async (firstRow, rows) =>
    (await readPairs(firstRow, rows)).map((code) => (code === OUTSIDE || known.has(code) ? code : OTHER_CHANGES));
  const described = [
    ...own.map((code) => {
      const [before, after] = pairOf(from, run, code);
      const [old, now] = [before?.name ?? UNCLASSIFIED.name, after?.name ?? UNCLASSIFIED.name];
      const colour = after?.colour ?? UNCLASSIFIED.colour;
      return { code, colour, name: old === now ? `${now}, both times` : `${old} to ${now}` };
    }),
    { code: OTHER_CHANGES, name: 'Other changes', colour: UNCLASSIFIED.colour },
  ];
  return { strata: withShares(await countStrata(run, read, described, plan.expectedOtherwise)), read };
}

function pairOf(from: Run, to: Run, code: number) {
  const [before, after] = [code >> 8, code & 255];
  return [from.classes.find((one) => one.code === before), to.classes.find((one) => one.code === after)] as const;
}

/** Pixels and true area of each stratum that holds any. */
async function countStrata(
  run: Run,
  read: ReadStrata,
  described: readonly { code: number; name: string; colour: string }[],
  expectedUsers: number,
): Promise<Omit<PlainStratum, 'share'>[]> {
  const placed = placeScene(run.scene);
  if (!placed) throw new NotFound();
  const { width, height } = placed.grid;
  const { rowAreaM2 } = measurePixelAreas(placed);
  const pixels = new Float64Array(OUTSIDE + 1);
  const areaM2 = new Float64Array(OUTSIDE + 1);
  for (let firstRow = 0; firstRow < height; firstRow += STRIP_ROWS) {
    const codes = await read(firstRow, Math.min(STRIP_ROWS, height - firstRow));
    for (let i = 0; i < codes.length; i++) {
      const code = codes[i] ?? OUTSIDE;
      pixels[code] = (pixels[code] ?? 0) + 1;
      areaM2[code] = (areaM2[code] ?? 0) + (rowAreaM2[firstRow + Math.floor(i / width)] ?? 0);
    }
  }
  return described
    .filter(({ code }) => (pixels[code] ?? 0) > 0)
    .map((stratum) => ({
      ...{ ...stratum, classId: null, expectedUsers },
      ...{ pixels: pixels[stratum.code] ?? 0, areaHa: (areaM2[stratum.code] ?? 0) / M2_PER_HA },
    }));
}
