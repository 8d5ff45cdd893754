import { describe, expect, it } from 'vitest';
import {
  fillBandSettings,
  measureGsdMeters,
  readRole,
  readWavelengthUm,
  type DescribedBand,
} from '../../server/services/ingest-band-settings.ts';

const band = (overrides: Partial<DescribedBand> = {}): DescribedBand => ({
  description: '',
  fileStem: null,
  colorInterp: 'Undefined',
  dtype: 'uint16',
  scale: 1,
  offset: 0,
  isOnSceneGrid: true,
  p2: 100,
  p98: 4000,
  ...overrides,
});
const rolesOf = (bands: DescribedBand[]) => fillBandSettings(bands).settings.map(({ role }) => role);

describe('the role a description names', () => {
  it.each([
    ['Blue', 'blue'],
    ['surface_reflectance_green', 'green'],
    ['Red 0.66 µm', 'red'],
    ['Red edge 1', 'red-edge'],
    ['Near-infrared', 'nir'],
    ['NIR', 'nir'],
    ['SWIR 1', 'swir1'],
    ['shortwave infrared 2', 'swir2'],
    ['swir2', 'swir2'],
    ['Shortwave 1.61 µm', 'swir1'],
    ['TIRS brightness temperature', 'thermal'],
    ['Coastal aerosol', 'coastal'],
    ['Panchromatic', 'pan'],
    ['Digital elevation (DEM)', 'elevation'],
    ['Band 4', 'other'],
    ['B8A', 'other'],
    ['Reduced', 'other'],
    ['', 'other'],
  ])('of "%s" is %s', (description, role) => {
    expect(readRole(description)).toBe(role);
  });
});

describe('the wavelength a description states', () => {
  it.each([
    ['red 0.66 µm', 0.66],
    ['665 nm', 0.665],
    ['Thermal 10.9 um', 10.9],
    ['NIR, 0.86 micrometers', 0.86],
    ['30 m', null],
    ['Band 4', null],
  ])('in "%s" is %s', (description, wavelengthUm) => {
    expect(readWavelengthUm(description)).toBe(wavelengthUm);
  });
});

describe('a band table filled from files', () => {
  it('guesses the roles of exactly four or six integer bands of which nothing is said', () => {
    const unnamed = (n: number, dtype = 'uint16') => Array.from({ length: n }, () => band({ dtype }));
    expect(rolesOf(unnamed(6))).toEqual(['blue', 'green', 'red', 'nir', 'swir1', 'swir2']);
    expect(rolesOf(unnamed(4, 'uint8'))).toEqual(['blue', 'green', 'red', 'nir']);
    expect(fillBandSettings(unnamed(4)).guessedRoles).toBe(true);
    for (const bands of [unnamed(3), unnamed(5), unnamed(7), unnamed(6, 'float32')]) {
      expect(new Set(rolesOf(bands))).toEqual(new Set(['other']));
      expect(fillBandSettings(bands).guessedRoles).toBe(false);
    }
  });

  it('guesses nothing once a band is named', () => {
    const bands = [band({ description: 'First' }), ...Array.from({ length: 5 }, () => band())];
    expect(fillBandSettings(bands).guessedRoles).toBe(false);
  });

  it('leaves a coarser band of another file out of the guess', () => {
    const bands = [band({ isOnSceneGrid: false }), ...Array.from({ length: 4 }, () => band())];
    expect(rolesOf(bands)).toEqual(['other', 'blue', 'green', 'red', 'nir']);
  });

  it('believes a full set of red, green and blue screen channels', () => {
    const bands = ['Red', 'Green', 'Blue', 'Undefined'].map((colorInterp) => band({ colorInterp, dtype: 'uint8' }));
    expect(fillBandSettings(bands)).toMatchObject({ guessedRoles: false });
    expect(rolesOf(bands)).toEqual(['red', 'green', 'blue', 'other']);
  });

  it('names a single-band file’s band after the file', () => {
    const { settings } = fillBandSettings([band({ fileStem: 'spring_nir' }), band({ description: 'Haze' }), band()]);
    expect(settings.map(({ name, role }) => [name, role])).toEqual([
      ['spring_nir', 'nir'],
      ['Haze', 'other'],
      ['Band 3', 'other'],
    ]);
  });

  it('takes a quantity from a declared scale only where the values can be it', () => {
    const quantity = (overrides: Partial<DescribedBand>) => fillBandSettings([band(overrides)]).settings[0].quantity;
    expect(quantity({ description: 'Red' })).toBe('digital number');
    expect(quantity({ description: 'Red', scale: 0.0001 })).toBe('reflectance');
    expect(quantity({ description: 'Red', scale: 0.1 })).toBe('digital number');
    expect(quantity({ description: 'Thermal', scale: 0.01, offset: 150, p2: 12_000, p98: 15_000 })).toBe('kelvin');
    expect(quantity({ description: 'Thermal', scale: 0.01, offset: 0, p2: 1_000, p98: 3_000 })).toBe('digital number');
    expect(quantity({ description: 'Elevation', scale: 0.0001 })).toBe('digital number');
  });
});

describe('the ground sample distance', () => {
  const grid = { width: 100, height: 100, originX: -15, originY: 60, pixelWidth: 0.001, pixelHeight: 0.001 };
  const crs = { wkt: '', epsg: 4326, name: '', proj4: '+proj=longlat +datum=WGS84 +no_defs' };

  it('is the pixel size of a metric grid', () => {
    const metric = { ...grid, originX: 500_000, originY: 6_700_000, pixelWidth: 30, pixelHeight: 30 };
    const utm = { ...crs, unit: 'metre' as const, proj4: '+proj=utm +zone=28 +datum=WGS84 +units=m +no_defs' };
    expect(measureGsdMeters({ crs: utm }, metric)).toBe(30);
  });

  it('is the root of the true area where pixels are measured in degrees', () => {
    // At 59.95° a degree of longitude is 55.88 km and one of latitude 111.41 km (series of Snyder 1987, PP 1395, p. 25; from memory).
    expect(measureGsdMeters({ crs: { ...crs, unit: 'degree' } }, grid)).toBeCloseTo(Math.sqrt(55.88 * 111.41), 1);
  });
});
