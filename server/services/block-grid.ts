import { bbox, booleanIntersects, polygon } from '@turf/turf';
import proj4 from 'proj4';
import type { ArealGeometry, Bounds, Polygon, Position } from '../../shared/contracts/geometry.ts';
import { type CutBlocks, MAX_BLOCKS } from '../../shared/contracts/block.ts';
import type { App } from '../app-context.ts';
import type { Project } from '../entities/project.ts';
import { Scene } from '../entities/scene.ts';
import { Conflict, InvalidInput } from '../errors.ts';
import { Block } from '../entities/block.ts';
import { addBlocks, type NewBlock } from './blocks.ts';

/** Rounding of the ground's corners begins no further row of blocks. */
const SLACK_METERS = 2;

/** Cuts the study area (or else what the scenes cover) into square blocks. */
export async function cutBlocks(app: App, project: Project, byId: string, input: CutBlocks): Promise<void> {
  const { sizeMeters, targetPerClass = null, replace = false } = input;
  const nStanding = await app.db.getRepository(Block).countBy({ projectId: project.id });
  if (nStanding > 0 && !replace) {
    throw new Conflict(
      `There are ${nStanding} blocks already.`,
      { advice: 'Say that they are to be replaced, or draw further blocks by hand.' },
      'has-blocks',
    );
  }
  const ground = project.studyArea ?? (await findSceneGround(app, project.id));
  const cells = layGrid(ground, sizeMeters);
  await addBlocks(
    app,
    project,
    byId,
    cells.map((cell) => ({ ...cell, targetPerClass })),
    { replace, said: `cut the study area into ${cells.length} blocks of ${Math.round(sizeMeters)} m` },
  );
}

async function findSceneGround(app: App, projectId: string): Promise<ArealGeometry> {
  const scenes = await app.db.getRepository(Scene).findBy({ projectId, state: 'ready' });
  const scene = scenes.find(({ footprint }) => footprint);
  if (!scene?.footprint) {
    throw new InvalidInput('There is nothing to cut into blocks.', {
      wanted: 'a study area, or a scene that is ready',
      advice: 'Set the study area first.',
    });
  }
  return scene.footprint;
}

/**
 * Squares of `sizeMeters` on the UTM zone of the ground's middle, from its north-west corner, those that meet the ground;
 * named by column and row: C4. Neighbours share their corners to the last digit.
 *
 * @throws InvalidInput when there would be more than MAX_BLOCKS
 */
export function layGrid(ground: ArealGeometry, sizeMeters: number): Omit<NewBlock, 'targetPerClass'>[] {
  const outline = ground.type === 'Polygon' ? [ground.coordinates] : ground.coordinates;
  const lonLat = bbox(ground) as Bounds;
  const utm = proj4('WGS84', describeUtm((lonLat[0] + lonLat[2]) / 2, (lonLat[1] + lonLat[3]) / 2));
  const places = outline.flat(2).map(([lon, lat]) => utm.forward<[number, number]>([lon, lat]));
  const west = Math.floor(Math.min(...places.map(([x]) => x)));
  const north = Math.ceil(Math.max(...places.map(([, y]) => y)));
  const nColumns = Math.ceil((Math.max(...places.map(([x]) => x)) - west - SLACK_METERS) / sizeMeters);
  const nRows = Math.ceil((north - Math.min(...places.map(([, y]) => y)) - SLACK_METERS) / sizeMeters);
  if (nColumns * nRows > MAX_BLOCKS * 4) throw refuseMany(nColumns * nRows);
  const corner = (column: number, row: number): Position => {
    const [lon, lat] = utm.inverse<[number, number]>([west + column * sizeMeters, north - row * sizeMeters]);
    return [lon, lat];
  };
  const cells: Omit<NewBlock, 'targetPerClass'>[] = [];
  for (let row = 0; row < nRows; row++) {
    for (let column = 0; column < nColumns; column++) {
      const [nw, sw, se, ne] = [
        corner(column, row),
        corner(column, row + 1),
        corner(column + 1, row + 1),
        corner(column + 1, row),
      ];
      const geometry: Polygon = { type: 'Polygon', coordinates: [[nw, sw, se, ne, nw]] };
      if (outline.some((rings) => booleanIntersects(polygon(rings), polygon(geometry.coordinates))))
        cells.push({ name: `${nameColumn(column)}${row + 1}`, geometry });
    }
  }
  if (cells.length > MAX_BLOCKS) throw refuseMany(cells.length);
  return cells;
}

function refuseMany(n: number): InvalidInput {
  return new InvalidInput('The blocks would be too many.', {
    found: `${n} blocks`,
    wanted: `at most ${MAX_BLOCKS}`,
    errors: [{ path: 'sizeMeters', message: 'Choose a larger block.' }],
  });
}

function describeUtm(lon: number, lat: number): string {
  const zone = Math.min(60, Math.floor((lon + 180) / 6) + 1);
  return `+proj=utm +zone=${zone} ${lat < 0 ? '+south ' : ''}+datum=WGS84 +units=m +no_defs`;
}

/** A, B, …, Z, AA, AB, … */
function nameColumn(column: number): string {
  const letter = String.fromCharCode(65 + (column % 26));
  return column < 26 ? letter : nameColumn(Math.floor(column / 26) - 1) + letter;
}
