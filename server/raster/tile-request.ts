import type { RasterGrid } from './raster-grid.ts';
import type { Resampling } from './sample-band.ts';

/** Red, green, blue and opacity, each 0–255. */
export type TileColor = [number, number, number, number];

/** Values shown as black and as full brightness (or the two ends of a ramp). */
export type Stretch = [low: number, high: number];

/** What a tile shows; `path`s are absolute paths of band files. */
export type TileLayer =
  | { kind: 'composite'; bands: [red: string, green: string, blue: string]; stretch: [Stretch, Stretch, Stretch] }
  | { kind: 'single'; band: string; stretch: Stretch; ramp?: TileColor[] }
  | { kind: 'classes'; band: string; palette: [code: number, color: TileColor][] };

/** Everything needed to draw one tile; plain data, so that it can be posted to a worker thread. */
export interface TileRequest {
  z: number;
  x: number;
  y: number;
  size?: 256 | 512;
  /** Proj string of the scene, as `SourceInfo.crs.proj4` has it. */
  crs: string;
  /** Grid of the scene; a band may stand on a coarser one. */
  grid: RasterGrid;
  layer: TileLayer;
  /** How imagery is resampled; classes are always taken as they are. */
  resampling?: Resampling;
  /** Brightness = fraction of the stretch to the power 1/gamma. */
  gamma?: number;
}
