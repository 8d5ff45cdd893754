import type { BandQuantity, BandRole } from './bands.ts';

/** How a product's stored values (DN) become a quantity: quantity = DN × scale + offset. */
export interface ValueScale {
  id: string;
  name: string;
  /** When it is the right one. */
  note: string;
  quantity: BandQuantity;
  scale: number;
  offset: number;
  /** Bands it is meant for; others are left as they are. */
  roles: readonly BandRole[];
}

const REFLECTIVE: readonly BandRole[] = [
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
];

/**
 * Scales of common surface products.
 *
 * OLI and TIRS: USGS FAQ on the scale factors of Collection 2 Level-2 science products; worked examples there:
 * DN 18 639 → 0.313 and DN 44 947 → 302.6 K. MSI: ESA's (DN − 1000) / 10 000 from processing baseline 04.00
 * (25 January 2022) on, DN / 10 000 before; the baseline counts, not the day of acquisition.
 */
export const VALUE_SCALES: readonly ValueScale[] = [
  {
    id: 'oli-c2-l2-reflectance',
    name: 'OLI Collection 2 Level-2, surface reflectance',
    note: 'DN × 0.0000275 − 0.2',
    quantity: 'reflectance',
    scale: 0.000_027_5,
    offset: -0.2,
    roles: REFLECTIVE,
  },
  {
    id: 'tirs-c2-l2-temperature',
    name: 'TIRS Collection 2 Level-2, surface temperature',
    note: 'DN × 0.00341802 + 149, in kelvin',
    quantity: 'kelvin',
    scale: 0.003_418_02,
    offset: 149,
    roles: ['thermal'],
  },
  {
    id: 'msi-l2a',
    name: 'MSI Level-2A, processing baseline 04.00 and later',
    note: 'DN × 0.0001 − 0.1',
    quantity: 'reflectance',
    scale: 0.0001,
    offset: -0.1,
    roles: REFLECTIVE,
  },
  {
    id: 'msi-l2a-before-04',
    name: 'MSI Level-2A, before baseline 04.00 or harmonised',
    note: 'DN × 0.0001',
    quantity: 'reflectance',
    scale: 0.0001,
    offset: 0,
    roles: REFLECTIVE,
  },
];
