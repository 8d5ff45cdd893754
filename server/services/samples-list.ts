import type { Bounds } from '../../shared/contracts/geometry.ts';
import type { App } from '../app-context.ts';
import type { Sample } from '../entities/sample.ts';
import { findIndependentBlocks } from './block-independence.ts';

/** A sample as the list carries it. */
export interface SampleListRow extends Omit<
  Sample,
  'project' | 'scene' | 'landClass' | 'block' | 'createdBy' | 'deletedAt'
> {
  createdBy: { id: string; name: string } | null;
}

interface RawSample extends Omit<SampleListRow, 'geometry' | 'createdBy'> {
  geometry: { x: number; y: number }[][];
  createdByName: string | null;
}

/**
 * The samples on the map, by number; with bounds only those whose own bounds meet them. One query whatever their number, and the driver reads
 * geometry in binary: ten thousand samples are a matter of a few tenths of a second. What others drew in a block the viewer labels
 * independently is left out.
 */
export async function listSamples(
  app: App,
  projectId: string,
  bounds: Bounds | null,
  viewerId: string,
): Promise<SampleListRow[]> {
  const withheld = await findIndependentBlocks(app, projectId, viewerId);
  const boxes = bounds ? boxesAsWkt(bounds) : [];
  const rows = await app.db.query<RawSample[]>(
    `SELECT s.id, s.projectId, s.number, s.sceneId, s.classId, s.geometry, s.confidence, s.note, s.pixelCount, s.areaHa,
       s.version, s.state, s.blockId, s.openRemarks, s.createdById, s.createdAt, s.updatedAt, u.name AS createdByName
     FROM samples s LEFT JOIN users u ON u.id = s.createdById
     WHERE s.projectId = ? AND s.deletedAt IS NULL
       ${boxes.length ? `AND (${boxes.map(() => 'MBRIntersects(s.geometry, ST_GeomFromText(?))').join(' OR ')})` : ''}
       ${withheld.length ? 'AND (s.blockId IS NULL OR s.createdById = ? OR s.blockId NOT IN (?))' : ''}
     ORDER BY s.number`,
    [projectId, ...boxes, ...(withheld.length ? [viewerId, withheld] : [])],
  );
  return rows.map(({ geometry, createdByName, ...row }) => ({
    ...row,
    geometry: {
      type: 'Polygon',
      coordinates: geometry.map((ring) => ring.map(({ x, y }): [number, number] => [x, y])),
    },
    createdBy: row.createdById === null ? null : { id: row.createdById, name: createdByName ?? '' },
  }));
}

function boxesAsWkt([west, south, east, north]: Bounds): string[] {
  const box = (from: number, to: number) =>
    `POLYGON((${from} ${south}, ${to} ${south}, ${to} ${north}, ${from} ${north}, ${from} ${south}))`;
  // A west beyond the east means across the antimeridian (RFC 7946, section 5.2).
  return west <= east ? [box(west, east)] : [box(west, 180), box(-180, east)];
}
