import type { EntityManager } from 'typeorm';

/** A sample belongs to the block its centroid lies in; on a shared edge, to the block of the lower number. */
export async function placeSamples(manager: EntityManager, projectId: string, sampleId?: string): Promise<void> {
  await manager.query(
    `UPDATE samples s SET s.blockId = (
       SELECT b.id FROM blocks b
       WHERE b.projectId = s.projectId AND ST_Intersects(b.geometry, ST_Centroid(s.geometry))
       ORDER BY b.number LIMIT 1)
     WHERE s.projectId = ? ${sampleId ? 'AND s.id = ?' : ''}`,
    sampleId ? [projectId, sampleId] : [projectId],
  );
}
