import { stringify } from 'csv-stringify/sync';
import type { Readable } from 'node:stream';
import { ZipFile } from 'yazl';
import { MAP_CAUTIONS, PURPOSIVE_CAUTION } from '../../shared/constants/cautions.ts';
import { NODATA_CODE } from '../../shared/constants/class-codes.ts';
import type { Run as RunContract } from '../../shared/contracts/run.ts';
import type { App } from '../app-context.ts';
import { PostProcessingRevision } from '../entities/post-processing-revision.ts';
import type { Run } from '../entities/run.ts';
import { describeApplied } from './describe-step.ts';
import { requireResult } from './accuracy.ts';

type ClassArea = NonNullable<RunContract['areas']>[number];

/** Name of a run's downloads, without a folder or extension: letters, digits and hyphens only. */
export function nameDownload(run: Run, what: string): string {
  const slug = run.name
    .normalize('NFKD')
    .replace(/[^A-Za-z0-9]+/g, '-')
    .replace(/^-+|-+$/g, '')
    .toLowerCase()
    .slice(0, 40);
  return ['run', String(run.number), slug, what].filter((part) => part !== '').join('-');
}

/** The class map for someone else's hands: GeoTIFF, class names, areas, and what to know before relying on it. */
export async function packClassMap(app: App, run: Run, projectName: string, areas: ClassArea[]): Promise<Readable> {
  const applied = await findApplied(app, run);
  const { mapKey, mapNamesKey } = requireResult(run);
  const zip = new ZipFile();
  const mtime = run.job.endedAt ?? run.createdAt;
  const mapStream = await app.files.stream(mapKey);
  // Its blocks are deflated already.
  zip.addReadStream(mapStream, 'class-map.tif', { mtime, compress: false, size: await app.files.sizeBytes(mapKey) });
  zip.addBuffer(await app.files.read(mapNamesKey), 'class-map.tif.aux.xml', { mtime });
  zip.addBuffer(Buffer.from(writeClassesCsv(areas)), 'classes.csv', { mtime });
  zip.addBuffer(Buffer.from(writeReadme(run, projectName, applied)), 'README.txt', { mtime });
  const out = zip.outputStream as Readable;
  mapStream.on('error', (error) => out.destroy(error));
  out.on('close', () => mapStream.destroy());
  zip.end();
  return out;
}

function writeClassesCsv(areas: readonly ClassArea[]): string {
  const rows = areas.map(({ code, name, colour, pixels, areaHa }) => [code, name, colour, pixels, areaHa]);
  return stringify([['code', 'name', 'colour', 'pixels', 'area_ha'], ...rows], { escape_formulas: true });
}

/** What was done to the map after the classifier, in words. */
async function findApplied(app: App, run: Run): Promise<ReturnType<typeof describeApplied>> {
  const { revision: number } = requireResult(run);
  const revision =
    number === undefined
      ? null
      : await app.db.getRepository(PostProcessingRevision).findOneBy({ runId: run.id, number });
  return describeApplied(revision?.steps ?? [], revision?.effects ?? [], run.classes);
}

function writeReadme(run: Run, projectName: string, applied: ReturnType<typeof describeApplied>): string {
  const result = requireResult(run);
  const bullets = (lines: readonly string[]) => lines.map((line) => `- ${line}`).join('\n');
  return [
    `Class map of run ${run.number}${run.name ? ` (${run.name})` : ''}`,
    `Project: ${projectName}`,
    `Scene: ${run.scene.name}${run.scene.acquiredOn ? `, acquired ${run.scene.acquiredOn}` : ''}`,
    `Started: ${run.createdAt.toISOString()}`,
    '',
    'FILES',
    bullets([
      `class-map.tif: one byte a pixel, the class code; ${NODATA_CODE} is no data or outside the study area`,
      'class-map.tif.aux.xml: class names, for programs built on GDAL; keep it beside the GeoTIFF',
      'classes.csv: code, name, colour, pixels and area of each class',
    ]),
    '',
    'BEFORE RELYING ON IT',
    bullets(MAP_CAUTIONS),
    bullets([
      `Accuracy: ${PURPOSIVE_CAUTION} ${result.heldOutPolygons} polygons were held out; the project’s accuracy page has the figures.`,
      'Areas are counts of mapped pixels, not error-adjusted estimates.',
    ]),
    '',
    'HOW IT WAS MADE',
    bullets([
      `${result.trainingPixels} training pixels of ${result.trainingPolygons} polygons`,
      ...run.warnings,
      ...result.notes,
    ]),
    '',
    ...(applied.steps.length > 0 ? ['AFTER CLASSIFICATION, IN THIS ORDER', bullets(applied.steps), ''] : []),
    ...(applied.byHand.length > 0 ? ['EDITS BY HAND', bullets(applied.byHand), ''] : []),
    ...(result.raw ? [`SHA-256 of the classifier’s own class codes: ${result.raw.classMapSha256}`] : []),
    `SHA-256 of the class codes (row by row, one byte a pixel): ${result.classMapSha256}`,
    `SHA-256 of samples, classes, study area and bands: ${run.inputSha256}`,
    '',
    'Recipe, to make it again:',
    JSON.stringify(run.recipe, null, 2),
    '',
  ].join('\n');
}
