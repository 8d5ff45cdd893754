import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import type { Polygon } from '../../../../shared/contracts/geometry.ts';
import type { Sample } from '../../../../shared/contracts/sample.ts';

/** A unit square in degrees whose west edge lies at `westDeg`. */
export function square(westDeg: number): Polygon {
  const eastDeg = westDeg + 1;
  return {
    type: 'Polygon',
    coordinates: [
      [
        [westDeg, 0],
        [eastDeg, 0],
        [eastDeg, 1],
        [westDeg, 1],
        [westDeg, 0],
      ],
    ],
  };
}

export function makeClass(id: string, name: string, position: number): LandClass {
  return {
    id,
    projectId: 'project',
    code: position + 1,
    name,
    colour: '#336699',
    definition: '',
    position,
    sampleCount: 0,
    version: 1,
  };
}

export function makeSample(overrides: Partial<Sample> = {}): Sample {
  return {
    id: 'sample',
    projectId: 'project',
    number: 1,
    sceneId: 'scene',
    classId: 'water',
    geometry: square(0),
    confidence: 'medium',
    note: '',
    pixelCount: 20,
    areaHa: 1.8,
    version: 1,
    state: 'draft',
    blockId: null,
    openRemarks: 0,
    createdBy: { id: 'a', name: 'Labeller A' },
    createdAt: '2026-05-01T10:00:00.000Z',
    updatedAt: '2026-05-01T10:00:00.000Z',
    abilities: { edit: true, review: false },
    ...overrides,
  };
}
