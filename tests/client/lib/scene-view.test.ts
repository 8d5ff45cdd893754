import { describe, expect, it } from 'vitest';
import { bandPercentile } from '../../../client/src/lib/band-percentile.ts';
import { finestTileZoom, unwrapBounds, unwrapLongitude } from '../../../client/src/lib/map-bounds.ts';
import {
  DEFAULT_VIEW,
  sceneComposites,
  sceneTileUrl,
  shownCompositeId,
  viewBands,
} from '../../../client/src/lib/scene-view.ts';
import type { BandRole } from '../../../shared/constants/bands.ts';
import type { Band } from '../../../shared/contracts/scene.ts';

const statistics = {
  validPixels: 100,
  nodataPixels: 0,
  min: 0,
  max: 100,
  mean: 50,
  standardDeviation: 20,
  p2: 7,
  p98: 91,
  // Four bins of 25: a quarter of the pixels below 25, half of them between 50 and 75.
  histogram: { low: 0, high: 100, counts: [25, 0, 50, 25] },
};
function makeBand(number: number, role: BandRole): Band {
  return {
    id: `band-${number}`,
    number,
    name: role,
    role,
    centreWavelengthUm: null,
    gsdMeters: 30,
    scale: 1,
    offset: 0,
    quantity: 'reflectance',
    nodata: null,
    dataType: 'uint16',
    width: 10,
    height: 10,
    sha256: '',
    statistics,
  };
}
const roles: BandRole[] = ['blue', 'green', 'red', 'nir', 'swir1', 'swir2', 'thermal'];
const bands = roles.map((role, index) => makeBand(index + 1, role));
const scene = { id: 'scene', bands, contentKey: 'k/1' };

describe('composites of a scene', () => {
  it('are those its band roles allow, thermal in one band', () => {
    expect(sceneComposites(bands).map(({ id, bands: numbers }) => [id, numbers])).toEqual([
      ['natural', [3, 2, 1]],
      ['infrared', [4, 3, 2]],
      ['shortwave', [6, 4, 3]],
      ['thermal', [7]],
    ]);
    expect(sceneComposites(bands.slice(0, 3)).map(({ id }) => id)).toEqual(['natural']);
  });

  it('fall back to what the scene has when the view asks for a band it lacks', () => {
    const threeBands = bands.slice(0, 3);
    expect(viewBands(threeBands, { ...DEFAULT_VIEW, compositeId: 'thermal' })).toEqual([3, 2, 1]);
    const custom = { ...DEFAULT_VIEW, compositeId: 'custom', customBands: [9, 1, 1] as const };
    expect(viewBands(threeBands, custom)).toEqual([3, 2, 1]);
    expect(shownCompositeId(threeBands, custom)).toBe('natural');
    expect(viewBands([makeBand(1, 'other')], DEFAULT_VIEW)).toEqual([1]);
  });
});

describe('the tile address', () => {
  it('has bands, each band’s limits, gamma and the content key, and leaves the tile’s place to the map', () => {
    expect(sceneTileUrl(scene, DEFAULT_VIEW)).toBe(
      '/api/v1/scenes/scene/tiles/{z}/{x}/{y}.webp?bands=3,2,1&stretch=7:91,7:91,7:91&gamma=1&v=k%2F1',
    );
  });

  it('follows the stretch', () => {
    const stretch = { lowPercent: 0, highPercent: 100, gamma: 1.4142 };
    const url = sceneTileUrl(scene, { ...DEFAULT_VIEW, compositeId: 'thermal', stretch });
    expect(url).toContain('bands=7&stretch=0:100&gamma=1.41&');
  });
});

describe('a band’s percentile', () => {
  it('is read off the histogram with straight lines inside a bin', () => {
    expect(bandPercentile(statistics, 10)).toBe(10);
    expect(bandPercentile(statistics, 50)).toBe(62.5);
    expect(bandPercentile(statistics, 75)).toBe(75);
  });

  it('is exact where the statistics are', () => {
    expect([0, 2, 98, 100].map((percent) => bandPercentile(statistics, percent))).toEqual([0, 7, 91, 100]);
  });
});

describe('bounds on the map', () => {
  it('go on past 180° across the antimeridian, and places with them', () => {
    const bounds = unwrapBounds([178, -20, -179, -18]);
    expect(bounds).toEqual([178, -20, 181, -18]);
    expect(unwrapLongitude(-179.5, bounds)).toBe(180.5);
    expect(unwrapLongitude(178.5, bounds)).toBe(178.5);
    expect(unwrapLongitude(-17, unwrapBounds([-16.7, 59, -16, 60]))).toBe(-17);
  });

  it('ask for tiles three levels past the scene’s own pixels', () => {
    // At the equator a zoom-12 tile pixel is 38.2 m and a zoom-13 one 19.1 m; 30 m pixels are reached at 13.
    const degrees = (300 * 30) / (40_075_016.686 / 360);
    expect(finestTileZoom([0, -degrees / 2, 1, degrees / 2], 300)).toBe(16);
  });
});
