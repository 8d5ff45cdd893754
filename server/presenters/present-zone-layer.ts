import type { ZoneLayer as ZoneLayerContract } from '../../shared/contracts/zone.ts';
import type { ZoneLayer } from '../entities/zone-layer.ts';
import { can } from '../policies/policy-table.ts';
import type { Viewer } from '../policies/viewer.ts';
import { presentPerson } from './present-account.ts';

export function presentZoneLayer(layer: ZoneLayer, viewer: Viewer): ZoneLayerContract {
  const { id, projectId, name, zones, createdBy, createdAt } = layer;
  return {
    ...{ id, projectId, name, zones: zones.map((zone) => ({ name: zone.name, areaHa: zone.areaHa })) },
    createdBy: presentPerson(createdBy),
    createdAt: createdAt.toISOString(),
    abilities: { delete: can('design.plan', viewer.roles) },
  };
}
