import { defaultSourceLimits, type SourceInfo } from '../raster/inspect-source.ts';
import type { RasterGrid } from '../raster/raster-grid.ts';
import { IngestRefusal } from './ingest-failure.ts';

/** An inspected file of an upload. */
export interface IngestSource {
  name: string;
  path: string;
  info: SourceInfo;
}

export function gridOf({ width, height, transform }: SourceInfo): RasterGrid {
  return { width, height, ...transform };
}

/**
 * Chooses the file whose grid, the finest, becomes the scene's, and checks that all files show the same place in the same
 * reference system. Coarser bands keep their own grids.
 * @throws IngestRefusal saying which file does not fit
 */
export function chooseSceneSource(sources: readonly IngestSource[]): IngestSource {
  const [first, ...others] = sources;
  if (!first) throw new RangeError('a scene needs at least one file');
  const finest = others.reduce((best, source) => (pixelArea(source) < pixelArea(best) ? source : best), first);
  for (const source of sources) if (source !== finest) checkFits(source, finest);
  const nBands = sources.reduce((sum, { info }) => sum + info.bands.length, 0);
  if (nBands > defaultSourceLimits.maxBands) {
    throw new IngestRefusal({
      code: 'too-many-bands',
      found: `${nBands} bands in ${sources.length} files`,
      wanted: `at most ${defaultSourceLimits.maxBands}`,
      advice: 'Leave out the bands that do not matter.',
    });
  }
  return finest;
}

function pixelArea({ info: { transform } }: IngestSource): number {
  return transform.pixelWidth * transform.pixelHeight;
}

function isSameCrs(a: SourceInfo, b: SourceInfo): boolean {
  if (a.crs.epsg !== null && b.crs.epsg !== null) return a.crs.epsg === b.crs.epsg;
  return a.crs.wkt === b.crs.wkt || a.crs.proj4 === b.crs.proj4;
}

function checkFits(source: IngestSource, finest: IngestSource): void {
  if (!isSameCrs(source.info, finest.info)) {
    throw new IngestRefusal({
      code: 'crs-mismatch',
      found: `${source.name} in "${source.info.crs.name}" and ${finest.name} in "${finest.info.crs.name}"`,
      wanted: 'all files of a scene in one coordinate reference system',
      advice: 'Reproject one of them with gdalwarp -t_srs, or upload them as scenes of their own.',
    });
  }
  const scene = gridOf(finest.info);
  const grid = gridOf(source.info);
  const covered = coveredShare(scene, grid);
  if (covered === 0) {
    throw new IngestRefusal({
      code: 'no-overlap',
      found: `${source.name} and ${finest.name}, which do not overlap`,
      wanted: 'files that show the same place',
      advice: 'Upload another place as a scene of its own.',
    });
  }
  const hasNodata = source.info.maskKind !== 'none' || source.info.bands.every((band) => band.nodata !== null);
  if (!hasNodata && !reachesAllCentres(scene, grid)) {
    throw new IngestRefusal({
      code: 'partial-cover',
      found: `${source.name}, which covers ${Math.floor(covered * 100)} % of ${finest.name} and declares no nodata value`,
      wanted: 'a file that covers the whole scene, or one with a nodata value for the rest',
      advice:
        'Cut the finer file to this one with gdal_translate -projwin, or assign nodata with gdal_translate -a_nodata.',
    });
  }
}

function coveredShare(scene: RasterGrid, grid: RasterGrid): number {
  const overlap = (aFrom: number, aSpan: number, bFrom: number, bSpan: number): number =>
    Math.max(0, Math.min(aFrom + aSpan, bFrom + bSpan) - Math.max(aFrom, bFrom)) / aSpan;
  const [sceneWidth, sceneHeight] = [scene.width * scene.pixelWidth, scene.height * scene.pixelHeight];
  const [gridWidth, gridHeight] = [grid.width * grid.pixelWidth, grid.height * grid.pixelHeight];
  return (
    overlap(scene.originX, sceneWidth, grid.originX, gridWidth) *
    overlap(-scene.originY, sceneHeight, -grid.originY, gridHeight)
  );
}

/** Whether every scene pixel finds a value: a fringe of one coarse pixel is read from its edge (see readSceneWindow). */
function reachesAllCentres(scene: RasterGrid, grid: RasterGrid): boolean {
  const reaches = (sceneFrom: number, sceneStep: number, n: number, from: number, step: number, size: number) => {
    const first = (sceneFrom + 0.5 * sceneStep - from) / step;
    const last = (sceneFrom + (n - 0.5) * sceneStep - from) / step;
    return first > -1 && last < size + 1;
  };
  return (
    reaches(scene.originX, scene.pixelWidth, scene.width, grid.originX, grid.pixelWidth, grid.width) &&
    reaches(-scene.originY, scene.pixelHeight, scene.height, -grid.originY, grid.pixelHeight, grid.height)
  );
}
