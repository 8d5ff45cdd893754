import type { LandClass as LandClassContract } from '../../shared/contracts/land-class.ts';
import type { LandClassRow } from '../services/land-classes.ts';

export function presentLandClass({ landClass, sampleCount }: LandClassRow): LandClassContract {
  const { id, projectId, code, name, colour, definition, position, version } = landClass;
  return { id, projectId, code, name, colour, definition, position, sampleCount, version };
}
