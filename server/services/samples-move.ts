import type { EntityManager } from 'typeorm';

/**
 * Gives all samples of a class to another, each with a line in its history; a few statements whatever their number.
 * Deleted samples move without a line: nothing of theirs is on the map.
 */
export async function moveSamples(
  manager: EntityManager,
  fromClassId: string,
  toClassId: string,
  byId: string,
): Promise<void> {
  await manager.query(
    'UPDATE samples SET classId = ?, version = version + 1, updatedAt = NOW(6) WHERE classId = ? AND deletedAt IS NULL',
    [toClassId, fromClassId],
  );
  // Samples that were in the other class before have a line for their version already.
  await manager.query(
    `INSERT INTO sample_versions
       (id, sampleId, versionNumber, \`change\`, classId, geometry, confidence, note, pixelCount, areaHa, byId)
     SELECT UUID(), s.id, s.version, 'edited', s.classId, s.geometry, s.confidence, s.note, s.pixelCount, s.areaHa, ?
     FROM samples s
     LEFT JOIN sample_versions v ON v.sampleId = s.id AND v.versionNumber = s.version
     WHERE s.classId = ? AND s.deletedAt IS NULL AND v.id IS NULL`,
    [byId, toClassId],
  );
  await manager.query('UPDATE samples SET classId = ? WHERE classId = ?', [toClassId, fromClassId]);
}
