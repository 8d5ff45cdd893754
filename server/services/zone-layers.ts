import { arealGeometrySchema } from '../../shared/contracts/geometry.ts';
import { ellipsoidalMultiPolygonAreaM2 } from '../analysis/sampling/ellipsoidal-area.ts';
import type { App } from '../app-context.ts';
import { ZoneLayer, type Zone } from '../entities/zone-layer.ts';
import { InvalidInput, NotFound } from '../errors.ts';
import { readVectorFile, type VectorFeature } from '../raster/read-vector.ts';
import { VectorRefusal } from '../raster/vector-refusal.ts';
import { recordActivity } from './activities.ts';

/** Zones are strata: more of them would have two points each and tell nothing. */
const MAX_ZONES = 200;
const MAX_POSITIONS = 200_000;
const MAX_NAME = 120;
const M2_PER_HA = 10_000;

export function listZoneLayers(app: App, projectId: string): Promise<ZoneLayer[]> {
  return app.db
    .getRepository(ZoneLayer)
    .find({ where: { projectId }, relations: { createdBy: true }, order: { createdAt: 'ASC' } });
}

export function findZoneLayer(app: App, id: string): Promise<ZoneLayer | null> {
  return app.db.getRepository(ZoneLayer).findOne({ where: { id }, relations: { createdBy: true } });
}

/** The layer of that project. @throws InvalidInput for another */
export async function requireZoneLayer(app: App, projectId: string, id: string): Promise<ZoneLayer> {
  const layer = await findZoneLayer(app, id);
  if (layer?.projectId === projectId) return layer;
  throw new InvalidInput('There is no such zone layer in this project.', {
    errors: [{ path: 'layerId', message: 'Choose a zone layer of this project.' }],
  });
}

/**
 * Takes a vector file in as zones, one a feature; features of the same name become one zone.
 * @param nameField field with the zones' names; the first one of text where not given
 * @throws InvalidInput when the file cannot be used, saying what was found
 */
export async function addZoneLayer(
  app: App,
  projectId: string,
  byId: string,
  input: { path: string; name: string; nameField: string | null },
): Promise<ZoneLayer> {
  const zones = await readZones(app, input);
  const id = await app.db.transaction(async (manager) => {
    const layer = await manager.save(
      ZoneLayer,
      manager.create(ZoneLayer, { projectId, name: input.name, zones, createdById: byId }),
    );
    await recordActivity(manager, projectId, byId, `brought in the zones “${input.name}”`, 'accuracy');
    return layer.id;
  });
  await app.events.publish(projectId, { type: 'changed', what: 'designs', id, by: byId });
  const layer = await findZoneLayer(app, id);
  if (!layer) throw new NotFound();
  return layer;
}

/** Removes a layer; designs drawn by it keep their strata. */
export async function deleteZoneLayer(app: App, layer: ZoneLayer, byId: string): Promise<void> {
  await app.db.transaction(async (manager) => {
    await manager.delete(ZoneLayer, { id: layer.id });
    await recordActivity(manager, layer.projectId, byId, `deleted the zones “${layer.name}”`, 'accuracy');
  });
  await app.events.publish(layer.projectId, { type: 'changed', what: 'designs', id: layer.id, by: byId });
}

async function readZones(app: App, { path, nameField }: { path: string; nameField: string | null }): Promise<Zone[]> {
  const scratch = await app.files.scratch('zones');
  try {
    const file = await readVectorFile(path, { scratchDir: scratch.path, maxFeatures: 10_000 });
    const field = nameField ?? findNameField(file.features, file.fields);
    if (nameField !== null && !file.fields.includes(nameField)) {
      throw refuse(`no field is called ${nameField}`, `one of ${file.fields.join(', ')}`);
    }
    return gatherZones(file.features, field);
  } catch (error) {
    if (error instanceof VectorRefusal) throw refuse(error.message, 'GeoJSON, GeoPackage, KML or a zipped Shapefile');
    throw error;
  } finally {
    await scratch.dispose();
  }
}

function findNameField(features: readonly VectorFeature[], fields: readonly string[]): string | null {
  return fields.find((field) => features.every(({ properties }) => typeof properties[field] === 'string')) ?? null;
}

function gatherZones(features: readonly VectorFeature[], field: string | null): Zone[] {
  const byName = new Map<string, Zone['polygons']>();
  let nPositions = 0;
  features.forEach(({ geometry, properties }, place) => {
    const parsed = arealGeometrySchema.safeParse(geometry);
    if (!parsed.success)
      throw refuse(`feature ${place + 1} is a ${geometry?.type ?? 'row without a shape'}`, 'polygons');
    const said = field === null ? null : properties[field];
    const name = (said === null || said === undefined || said === '' ? `Zone ${place + 1}` : String(said)).slice(
      0,
      MAX_NAME,
    );
    const polygons = parsed.data.type === 'Polygon' ? [parsed.data.coordinates] : parsed.data.coordinates;
    nPositions += polygons.flat(2).length;
    byName.set(name, [...(byName.get(name) ?? []), ...polygons]);
  });
  if (byName.size === 0) throw refuse('it holds no feature', 'at least one polygon');
  if (byName.size > MAX_ZONES) throw refuse(`${byName.size} zones`, `at most ${MAX_ZONES}`);
  if (nPositions > MAX_POSITIONS) throw refuse(`${nPositions} corners`, `at most ${MAX_POSITIONS}`);
  return [...byName].map(([name, polygons]) => ({
    name,
    areaHa: ellipsoidalMultiPolygonAreaM2(polygons) / M2_PER_HA,
    polygons,
  }));
}

function refuse(found: string, wanted: string): InvalidInput {
  return new InvalidInput(
    'The file cannot be used as zones.',
    { found, wanted, errors: [{ path: 'files', message: `Found: ${found}.` }] },
    'file-refused',
  );
}
