export const BAND_ROLES = [
  'coastal',
  'blue',
  'green',
  'red',
  'red-edge',
  'nir',
  'swir1',
  'swir2',
  'cirrus',
  'pan',
  'thermal',
  'elevation',
  'other',
] as const;
export type BandRole = (typeof BAND_ROLES)[number];

export const BAND_ROLE_NAME: Record<BandRole, string> = {
  coastal: 'Coastal',
  blue: 'Blue',
  green: 'Green',
  red: 'Red',
  'red-edge': 'Red edge',
  nir: 'Near infrared',
  swir1: 'Shortwave infrared 1',
  swir2: 'Shortwave infrared 2',
  cirrus: 'Cirrus',
  pan: 'Panchromatic',
  thermal: 'Thermal',
  elevation: 'Elevation',
  other: 'Other',
};

/** What a band measures after scale and offset. */
export const BAND_QUANTITIES = ['reflectance', 'kelvin', 'digital number'] as const;
export type BandQuantity = (typeof BAND_QUANTITIES)[number];

/** Composites offered when a scene has the roles: red, green and blue channel of the screen in this order. */
export const COMPOSITES = [
  { id: 'natural', name: 'Natural colour', roles: ['red', 'green', 'blue'] },
  { id: 'infrared', name: 'Colour infrared', roles: ['nir', 'red', 'green'] },
  { id: 'shortwave', name: 'Shortwave', roles: ['swir2', 'nir', 'red'] },
] as const satisfies readonly { id: string; name: string; roles: readonly [BandRole, BandRole, BandRole] }[];
