import { BAND_ROLE_NAME, type BandRole } from '../../../../shared/constants/bands.ts';
import type { Band, Scene } from '../../../../shared/contracts/scene.ts';
import { THIN_SPACE, formatNumber } from '../../lib/format.ts';

/** The side of a scene's pixel as its band table has it: "30 m"; null when no band says. */
export function describePixel(bands: readonly Band[]): string | null {
  const finest = bands.reduce<number | null>(
    (best, { gsdMeters }) => (gsdMeters !== null && (best === null || gsdMeters < best) ? gsdMeters : best),
    null,
  );
  return finest === null ? null : `${formatShort(finest)}${THIN_SPACE}m`;
}

/** "1 200 × 1 000 pixels", or null before the ingest. */
export function describeSize({ width, height }: Pick<Scene, 'width' | 'height'>): string | null {
  if (!width || !height) return null;
  return `${formatNumber(width)} × ${formatNumber(height)} pixels`;
}

/** "EPSG:32628", the system's name where it has no code, or null before the ingest. */
export function describeCrs({ crsEpsg, crsName }: Pick<Scene, 'crsEpsg' | 'crsName'>): string | null {
  return crsEpsg === null ? crsName : `EPSG:${crsEpsg}`;
}

/** Where a list of roles must be short. */
const SHORT_ROLE_NAME: Partial<Record<BandRole, string>> = { nir: 'NIR', swir1: 'SWIR 1', swir2: 'SWIR 2' };

/** The roles the bands have, in their order: "Blue, Green, Red, NIR"; those without one are counted. */
export function describeBands(bands: readonly Band[]): string {
  const named = bands
    .filter(({ role }) => role !== 'other')
    .map(({ role }) => SHORT_ROLE_NAME[role] ?? BAND_ROLE_NAME[role]);
  const nOther = bands.length - named.length;
  if (named.length === 0) return 'no roles yet';
  return [...named, ...(nOther > 0 ? [`${nOther} without a role`] : [])].join(', ');
}

/** A figure with as many decimals as it needs, four at most: 30 → "30", 28.5 → "28.5". */
export function formatShort(value: number): string {
  const text = value.toFixed(4).replace(/\.?0+$/, '');
  return formatNumber(Number(text), (text.split('.')[1] ?? '').length);
}

/** The bands whose own pixels are coarser than the scene's: one value covers several pixels of the map. */
export function coarseBands({ bands, width, height }: Pick<Scene, 'bands' | 'width' | 'height'>): Band[] {
  const finest = Math.min(...bands.map(({ gsdMeters }) => gsdMeters ?? Infinity));
  return bands.filter(
    (band) =>
      (width !== null && height !== null && band.width < width && band.height < height) ||
      (band.gsdMeters !== null && band.gsdMeters > finest * 1.5),
  );
}
