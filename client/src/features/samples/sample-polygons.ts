import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import type { Sample } from '../../../../shared/contracts/sample.ts';
import type { PolygonCollection } from '../../components/map/canvas-polygons.tsx';

const NO_CLASS_COLOUR = '#85867a';

/** Samples as polygons of the map, in their class's colour and named for the pointer; large ones first, small ones on top. */
export function samplePolygons(samples: readonly Sample[], classes: ReadonlyMap<string, LandClass>): PolygonCollection {
  const bySize = [...samples].sort((first, second) => second.areaHa - first.areaHa);
  return {
    type: 'FeatureCollection',
    features: bySize.map(({ id, number, classId, geometry }) => {
      const landClass = classes.get(classId);
      return {
        type: 'Feature',
        id,
        geometry,
        properties: {
          id,
          colour: landClass?.colour ?? NO_CLASS_COLOUR,
          label: `${landClass?.name ?? 'Class taken away'}, sample ${number}`,
        },
      };
    }),
  };
}
