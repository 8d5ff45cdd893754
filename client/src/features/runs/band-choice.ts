import type { Band } from '../../../../shared/contracts/scene.ts';

/** More than half as wide again as the finest band: its footprint covers neighbouring pixels. */
const COARSER_BY = 1.5;

/** Whether a band was measured at a coarser ground sample distance than the scene's finest band. */
export function isCoarse(band: Pick<Band, 'gsdMeters'>, bands: readonly Pick<Band, 'gsdMeters'>[]): boolean {
  const known = bands.flatMap(({ gsdMeters }) => (gsdMeters === null ? [] : [gsdMeters]));
  return band.gsdMeters !== null && band.gsdMeters > COARSER_BY * Math.min(...known);
}
