import type { Band } from '../../../../shared/contracts/scene.ts';
import { THIN_SPACE, formatNumber } from '../../lib/format.ts';

/** More than half as wide again as the finest band: its footprint covers neighbouring pixels. */
const COARSER_BY = 1.5;

/** Whether a band was measured at a coarser ground sample distance than the scene's finest band. */
export function isCoarse(band: Pick<Band, 'gsdMeters'>, bands: readonly Pick<Band, 'gsdMeters'>[]): boolean {
  const known = bands.flatMap(({ gsdMeters }) => (gsdMeters === null ? [] : [gsdMeters]));
  return band.gsdMeters !== null && band.gsdMeters > COARSER_BY * Math.min(...known);
}

/** A ground sample distance to a tenth of a metre where it is no whole number: "30 m", "28.5 m". */
export function formatGsd(gsdMeters: number): string {
  const tenths = Math.round(gsdMeters * 10) / 10;
  return `${formatNumber(tenths, Number.isInteger(tenths) ? 0 : 1)}${THIN_SPACE}m`;
}
