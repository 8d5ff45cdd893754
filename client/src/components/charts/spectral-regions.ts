/**
 * Named regions of the spectrum by wavelength in µm, as remote sensing divides it (common practice, no single source;
 * books differ by about 0.1 µm at the edges).
 */
export const SPECTRAL_REGIONS = [
  { name: 'visible', shortName: 'VIS', longName: 'visible', fromUm: 0.38, toUm: 0.7 },
  { name: 'NIR', shortName: 'NIR', longName: 'near infrared', fromUm: 0.7, toUm: 1.3 },
  { name: 'SWIR', shortName: 'SWIR', longName: 'shortwave infrared', fromUm: 1.3, toUm: 3 },
  { name: 'TIR', shortName: 'TIR', longName: 'thermal infrared', fromUm: 8, toUm: 14 },
] as const;

/** The region a wavelength falls in, or null between the shortwave and the thermal. */
export function spectralRegionAt(wavelengthUm: number): (typeof SPECTRAL_REGIONS)[number] | null {
  return SPECTRAL_REGIONS.find(({ fromUm, toUm }) => wavelengthUm >= fromUm && wavelengthUm < toUm) ?? null;
}

/** Where thermal bands begin: they get a panel of their own. */
export const THERMAL_FROM_UM = 3;
