import { confidenceSchema } from '../../shared/contracts/sample.ts';
import type { ImportReport } from '../../shared/contracts/reference.ts';
import { cleanText } from '../../shared/contracts/text.ts';
import type { App } from '../app-context.ts';
import type { ReferenceDesign } from '../entities/reference-design.ts';
import { ReferencePoint } from '../entities/reference-point.ts';
import { InvalidInput, NotFound } from '../errors.ts';
import { requireOpen, writeAnswer, type GivenDetail } from './design-answers.ts';
import { pixelAt } from './design-places.ts';
import { findPlannedRun } from './planned-run.ts';
import { readVectorFile } from '../raster/read-vector.ts';
import { VectorRefusal } from '../raster/vector-refusal.ts';
import { readCsv, type TableRecord } from './read-csv.ts';
import { placeScene, type PlacedScene } from './run-scene.ts';

const MAX_ROWS = 20_000;
const MAX_NOTE = 2_000;

interface Columns {
  number: number;
  lon: number;
  lat: number;
  classKey: number;
  alternateKey: number;
  confidence: number;
  note: number;
}

/** Rolls a rehearsal back. */
class Rehearsed extends Error {}

/**
 * Takes answers from a table, as those of the person who brings it, and reports on every row. Rows name their point by
 * number, or by a position within its pixel. A rehearsal changes nothing.
 * @throws InvalidInput for a file that cannot be read or lacks its columns, Conflict "not-open"
 */
export async function importAnswers(
  app: App,
  design: ReferenceDesign,
  userId: string,
  { table, dryRun }: { table: readonly TableRecord[]; dryRun: boolean },
): Promise<ImportReport> {
  requireOpen(design);
  const [heading, ...records] = table;
  if (!heading) throw refuseFile('it has no heading');
  if (records.length > MAX_ROWS)
    throw refuseFile(`it has ${records.length} rows; at most ${MAX_ROWS} are taken at once`);
  const columns = findColumns(heading.fields);
  const run = await findPlannedRun(app, design.projectId, design.runId);
  const placed = placeScene(run.scene);
  if (!placed) throw new NotFound();
  const points = await app.db.getRepository(ReferencePoint).findBy({ designId: design.id });
  const finder = createPointLookup(points, placed);
  const rows: ImportReport['rows'] = [];
  const seen = new Map<number, number>();
  try {
    await app.db.transaction(async (manager) => {
      // A transaction that met a deadlock begins anew.
      rows.length = 0;
      seen.clear();
      for (const { line, fields } of records) {
        const read = readRow(design, columns, fields, finder);
        if (typeof read === 'string') {
          rows.push({ line, number: null, outcome: 'refused', reason: read });
          continue;
        }
        const { number } = read.point;
        const earlier = seen.get(number);
        if (earlier !== undefined) {
          rows.push({ line, number, outcome: 'refused', reason: `Line ${earlier} answers this point already.` });
          continue;
        }
        seen.set(number, line);
        const result = await writeAnswer(manager, design.id, read.point.id, userId, read.given);
        if ('refused' in result) rows.push({ line, number, outcome: 'refused', reason: result.refused });
        else rows.push({ line, number, outcome: result.outcome, reason: null });
      }
      if (dryRun) throw new Rehearsed();
    });
  } catch (error) {
    if (!(error instanceof Rehearsed)) throw error;
  }
  if (!dryRun)
    await app.events.publish(design.projectId, { type: 'changed', what: 'designs', id: design.id, by: userId });
  const count = (outcome: string) => rows.filter((row) => row.outcome === outcome).length;
  return { dryRun, taken: count('taken'), replaced: count('replaced'), refused: count('refused'), rows };
}

function refuseFile(found: string): InvalidInput {
  return new InvalidInput(
    'The file cannot be used.',
    {
      found,
      wanted:
        'a CSV with the columns number (or lon and lat) and class_code (or class), or points in a GeoPackage, GeoJSON, KML or zipped Shapefile with these fields',
      errors: [{ path: 'csv', message: `The file cannot be used: ${found}.` }],
    },
    'file-refused',
  );
}

/** @throws InvalidInput when it is no CSV */
export function readAnswerCsv(csv: string): TableRecord[] {
  try {
    return readCsv(csv);
  } catch (error) {
    if (error instanceof RangeError) throw refuseFile(error.message.replace(/\.$/, ''));
    throw error;
  }
}

/** Points of a vector file as a table with lon and lat before its own fields. @throws InvalidInput when it cannot be read */
export async function readAnswerFile(app: App, path: string): Promise<TableRecord[]> {
  const scratch = await app.files.scratch('answers');
  try {
    const { features, fields } = await readVectorFile(path, { scratchDir: scratch.path, maxFeatures: MAX_ROWS });
    const heading = { line: 0, fields: ['lon', 'lat', ...fields] };
    return [
      heading,
      ...features.map(({ geometry, properties }, place) => {
        const at = geometry?.type === 'Point' ? (geometry.coordinates as readonly [number, number]) : null;
        const position = at ? [String(at[0]), String(at[1])] : ['', ''];
        return { line: place + 1, fields: [...position, ...fields.map((field) => String(properties[field] ?? ''))] };
      }),
    ];
  } catch (error) {
    if (error instanceof VectorRefusal) throw refuseFile(error.message);
    throw error;
  } finally {
    await scratch.dispose();
  }
}

function findColumns(names: readonly string[]): Columns {
  const find = (...known: string[]) => names.findIndex((name) => known.includes(name.toLowerCase()));
  const columns: Columns = {
    number: find('number'),
    lon: find('lon', 'longitude'),
    lat: find('lat', 'latitude'),
    classKey: find('class_code', 'class'),
    alternateKey: find('alternate_code', 'alternate'),
    confidence: find('confidence'),
    note: find('note'),
  };
  if (columns.classKey < 0) throw refuseFile(`it has no column class_code or class, but ${names.join(', ')}`);
  if (columns.number < 0 && (columns.lon < 0 || columns.lat < 0)) {
    throw refuseFile(`it has neither a column number nor lon and lat, but ${names.join(', ')}`);
  }
  return columns;
}

interface PointLookup {
  byNumber(number: number): ReferencePoint | undefined;
  at(lon: number, lat: number): ReferencePoint | undefined;
}

function createPointLookup(points: readonly ReferencePoint[], placed: PlacedScene): PointLookup {
  const byNumber = new Map(points.map((point) => [point.number, point]));
  const byPixel = new Map(points.map((point) => [`${point.pixelRow}/${point.pixelColumn}`, point]));
  return {
    byNumber: (number) => byNumber.get(number),
    at(lon, lat) {
      const pixel = pixelAt(placed, lon, lat);
      return pixel ? byPixel.get(`${pixel.pixelRow}/${pixel.pixelColumn}`) : undefined;
    },
  };
}

/** What a row says; or, as text, why it cannot be taken. */
function readRow(
  design: ReferenceDesign,
  columns: Columns,
  fields: readonly string[],
  finder: PointLookup,
): { point: ReferencePoint; given: GivenDetail } | string {
  const field = (column: number) => (column < 0 ? '' : (fields[column] ?? ''));
  const toNumber = (text: string) => (text === '' ? NaN : Number(text));
  const numberText = field(columns.number);
  const [lon, lat] = [toNumber(field(columns.lon)), toNumber(field(columns.lat))];
  if (numberText === '' && !(Number.isFinite(lon) && Number.isFinite(lat))) return 'The row names no point.';
  const point = numberText === '' ? finder.at(lon, lat) : finder.byNumber(toNumber(numberText));
  if (!point) return numberText === '' ? 'No point of the design lies there.' : `There is no point ${numberText}.`;
  const findClass = (text: string) =>
    design.classes.find(({ code, name }) => String(code) === text || name.toLowerCase() === text.toLowerCase());
  const classText = field(columns.classKey);
  if (classText === '') return 'The row has no class.';
  const landClass = findClass(classText);
  if (!landClass) return `There is no class ${classText}.`;
  const alternateText = field(columns.alternateKey);
  const alternate = alternateText === '' ? null : findClass(alternateText);
  if (alternate === undefined) return `There is no class ${alternateText}.`;
  if (alternate?.id === landClass.id) return 'The alternate is the first choice.';
  const confidence = confidenceSchema.safeParse(field(columns.confidence).toLowerCase() || 'medium');
  if (!confidence.success) return `Confidence is low, medium or high, not ${field(columns.confidence)}.`;
  return {
    point,
    given: {
      classId: landClass.id,
      alternateClassId: alternate?.id ?? null,
      confidence: confidence.data,
      note: cleanText(field(columns.note)).slice(0, MAX_NOTE),
      source: 'import',
      seconds: null,
    },
  };
}
