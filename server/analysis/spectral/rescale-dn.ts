import { isNodata, type BandValues } from './band-values.ts';

/** How a product turns digital numbers into reflectance, kelvin or radiance: value = DN · scale + offset. */
export interface DnScaling {
  scale: number;
  offset: number;
  /** Fill value of the product; `null` when it has none. */
  nodata: number | null;
}

/** Surface reflectance of OLI Collection 2 Level-2 products. Source: USGS, Collection 2 Level-2 scale factors. */
export const oliCollection2Reflectance: DnScaling = { scale: 0.0000275, offset: -0.2, nodata: 0 };

/** Surface temperature in kelvin of TIRS Collection 2 Level-2 products. Source: USGS, as above. */
export const tirsCollection2Temperature: DnScaling = { scale: 0.00341802, offset: 149, nodata: 0 };

/**
 * Scaling of MSI Level-2A products from their metadata: (DN + additiveOffset) / quantification.
 * From processing baseline 04.00 the offset is −1000, before it 0; the metadata decides, not the date of the image.
 */
export function msiLevel2Scaling(additiveOffset: number, quantification: number): DnScaling {
  return { scale: 1 / quantification, offset: additiveOffset / quantification, nodata: 0 };
}

/**
 * Rescales digital numbers; no data becomes NaN, and values below 0 or above 1 are kept as they are (noise, not
 * errors).
 * @returns values of the same order and length.
 */
export function rescaleDn(values: BandValues, { scale, offset, nodata }: DnScaling): Float32Array {
  const rescaled = new Float32Array(values.length);
  for (let i = 0; i < values.length; i++) {
    rescaled[i] = isNodata(values[i], nodata) ? Number.NaN : values[i] * scale + offset;
  }
  return rescaled;
}

/**
 * Brightness temperature in kelvin of a spectral radiance (W m⁻² sr⁻¹ µm⁻¹): K2 / ln(K1 / L + 1).
 *
 * K1 and K2 come from the product's metadata. The 1 stands inside the logarithm: outside it the result is some 50 K
 * too low. A radiance of 0 or less, or NaN, gives NaN. Source: USGS, OLI/TIRS data users handbook.
 */
export function brightnessTemperatureK(radiance: number, k1: number, k2: number): number {
  return radiance > 0 ? k2 / Math.log(k1 / radiance + 1) : Number.NaN;
}
