import type { ProjectRole } from '../../shared/constants/roles.ts';
import type {
  DrawingMeasure as DrawingMeasureContract,
  Sample as SampleContract,
  SampleVersion as SampleVersionContract,
} from '../../shared/contracts/sample.ts';
import type { SampleVersion } from '../entities/sample-version.ts';
import { can } from '../policies/policy-table.ts';
import type { Viewer } from '../policies/viewer.ts';
import type { DrawingMeasure } from '../services/drawing-measure.ts';
import type { SampleListRow } from '../services/samples-list.ts';
import { presentPerson } from './present-account.ts';

/** The sample as stored, whoever looks at it. */
type PresentableSample = Omit<SampleListRow, 'createdBy'> & { createdBy: { id: string; name: string } | null };

function mayEdit(roles: readonly ProjectRole[], sample: PresentableSample, viewerId: string): boolean {
  return can('sample.edit', roles, sample.createdById === viewerId);
}

export function presentSample(sample: PresentableSample, viewer: Viewer): SampleContract {
  const { id, projectId, number, sceneId, classId, geometry, confidence, note, pixelCount, areaHa, version } = sample;
  const { state, blockId, openRemarks } = sample;
  return {
    ...{ id, projectId, number, sceneId, classId, geometry, confidence, note, pixelCount, areaHa, version },
    ...{ state, blockId, openRemarks },
    createdBy: presentPerson(sample.createdBy),
    createdAt: sample.createdAt.toISOString(),
    updatedAt: sample.updatedAt.toISOString(),
    abilities: {
      edit: mayEdit(viewer.roles, sample, viewer.userId),
      review: can('sample.review', viewer.roles),
    },
  };
}

export function presentSampleVersion(version: SampleVersion): SampleVersionContract {
  const { versionNumber, change, classId, geometry, confidence, note, pixelCount } = version;
  return {
    ...{ versionNumber, change, classId, geometry, confidence, note, pixelCount },
    by: presentPerson(version.by),
    at: version.createdAt.toISOString(),
  };
}

export function presentMeasure({ spectrum, ...measure }: DrawingMeasure): DrawingMeasureContract {
  return {
    ...measure,
    spectrum: spectrum.map(({ band, mean, standardDeviation }) => ({
      bandId: band.id,
      number: band.number,
      name: band.name,
      centreWavelengthUm: band.centreWavelengthUm,
      mean,
      standardDeviation,
      quantity: band.quantity,
    })),
  };
}
