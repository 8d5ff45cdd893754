import type { Band as BandContract, Probe, Scene as SceneContract } from '../../shared/contracts/scene.ts';
import type { Band } from '../entities/band.ts';
import { presentJob } from './present-job.ts';
import type { SceneProbe } from '../services/scene-probe.ts';
import { computeContentKey, type SceneRow } from '../services/scenes.ts';
import { presentPerson } from './present-account.ts';

function presentBand(band: Band): BandContract {
  const { id, number, name, role, centreWavelengthUm, gsdMeters, scale, offset, quantity } = band;
  const { nodata, dataType, width, height, sha256, statistics } = band;
  return {
    ...{ id, number, name, role, centreWavelengthUm, gsdMeters, scale, offset, quantity },
    ...{ nodata, dataType, width, height, sha256, statistics },
  };
}

export function presentScene({ scene, job }: SceneRow): SceneContract {
  return {
    id: scene.id,
    projectId: scene.projectId,
    name: scene.name,
    acquiredOn: scene.acquiredOn,
    state: scene.state,
    failure: scene.failure,
    job: job ? presentJob(job) : null,
    files: scene.files.map(({ name, bytes, sha256 }) => ({ name, bytes, sha256 })),
    width: scene.width,
    height: scene.height,
    pixelWidth: scene.pixelWidth,
    pixelHeight: scene.pixelHeight,
    crsName: scene.crsName,
    crsEpsg: scene.crsEpsg,
    crsProj4: scene.crsProj4,
    footprint: scene.footprint,
    bounds: scene.bounds,
    bands: scene.bands.map(presentBand),
    guessedRoles: scene.guessedRoles,
    contentKey: computeContentKey(scene.bands),
    uploadedBy: presentPerson(scene.uploadedBy),
    createdAt: scene.createdAt.toISOString(),
    version: scene.version,
  };
}

export function presentProbe({ pixel, bands, values }: SceneProbe): Probe {
  return {
    pixel: pixel ? { column: pixel.col, row: pixel.row } : null,
    values: bands.map((band, i) => ({
      bandId: band.id,
      number: band.number,
      name: band.name,
      centreWavelengthUm: band.centreWavelengthUm,
      stored: values[i]?.dn ?? null,
      value: values[i]?.scaled ?? null,
      quantity: band.quantity,
    })),
  };
}
