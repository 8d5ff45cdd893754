import type { BandRole } from '../../../../shared/constants/bands.ts';
import { type LandClass, landClassSchema } from '../../../../shared/contracts/land-class.ts';
import { type Band, type Scene, bandSchema } from '../../../../shared/contracts/scene.ts';

export const uuid = (n: number) => `00000000-0000-4000-8000-${String(n).padStart(12, '0')}`;

export function makeBand(number: number, role: BandRole, gsdMeters: number | null = 30): Band {
  return bandSchema.parse({
    ...{ id: uuid(100 + number), number, name: `Band ${number}`, role, centreWavelengthUm: null, gsdMeters },
    ...{ scale: 1, offset: 0, quantity: 'digital number', nodata: null, dataType: 'uint16', width: 10, height: 10 },
    sha256: 'a'.repeat(64),
    statistics: {
      ...{ validPixels: 100, nodataPixels: 0, min: 0, max: 9, mean: 4, standardDeviation: 1, p2: 0, p98: 9 },
      histogram: { low: 0, high: 9, counts: [1] },
    },
  });
}

/** What the recipe reads of a scene; the rest of a scene plays no part in it. */
export function makeScene(n: number, overrides: Partial<Scene> = {}): Scene {
  const scene: Partial<Scene> = {
    id: uuid(n),
    name: `Scene ${n}`,
    acquiredOn: null,
    state: 'ready',
    createdAt: `2025-09-0${n}T08:00:00Z`,
    bands: [makeBand(1, 'red'), makeBand(2, 'nir'), makeBand(3, 'thermal', 90)],
    ...overrides,
  };
  return scene as Scene;
}

export function makeClass(n: number, sampleCount: number): LandClass {
  return landClassSchema.parse({
    ...{ id: uuid(200 + n), projectId: uuid(1), code: n, name: `Class ${n}`, colour: '#294483', definition: '' },
    ...{ position: n - 1, sampleCount, version: 1 },
  });
}
