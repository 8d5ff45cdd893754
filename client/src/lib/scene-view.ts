import { COMPOSITES } from '../../../shared/constants/bands.ts';
import type { Band, Scene } from '../../../shared/contracts/scene.ts';
import { bandPercentile } from './band-percentile.ts';
import { API_BASE } from './fetch-json.ts';

/** One band in grey, or three bands as red, green and blue of the screen; band numbers from 1. */
export type ScreenBands = readonly [number] | readonly [number, number, number];

export interface Composite {
  id: string;
  name: string;
  bands: ScreenBands;
}

/** How stored values become screen values: cut at two percentiles of each band, then raised to 1/gamma. */
export interface Stretch {
  lowPercent: number;
  highPercent: number;
  gamma: number;
}

/** How a scene is looked at. `customBands` counts when `compositeId` is `custom`. */
export interface SceneView {
  compositeId: string;
  customBands: ScreenBands | null;
  stretch: Stretch;
}

export const CUSTOM_COMPOSITE = 'custom';
export const DEFAULT_STRETCH: Stretch = { lowPercent: 2, highPercent: 98, gamma: 1 };
export const DEFAULT_VIEW: SceneView = { compositeId: 'natural', customBands: null, stretch: DEFAULT_STRETCH };

/** The composites a scene's band roles allow, in the product's order, thermal last; empty for a scene without roles. */
export function sceneComposites(bands: readonly Band[]): Composite[] {
  const numberOf = (role: string) => bands.find((band) => band.role === role)?.number;
  const found: Composite[] = [];
  for (const { id, name, roles } of COMPOSITES) {
    const [red, green, blue] = roles.map(numberOf);
    if (red && green && blue) found.push({ id, name, bands: [red, green, blue] });
  }
  const thermal = numberOf('thermal');
  if (thermal) found.push({ id: 'thermal', name: 'Thermal', bands: [thermal] });
  return found;
}

/** The bands a view puts on the screen: its composite's, its own choice, or the scene's first composite or bands. */
export function viewBands(bands: readonly Band[], view: SceneView): ScreenBands {
  const has = (number: number) => bands.some((band) => band.number === number);
  if (view.compositeId === CUSTOM_COMPOSITE && view.customBands?.every(has)) return view.customBands;
  const composites = sceneComposites(bands);
  const chosen = composites.find((composite) => composite.id === view.compositeId) ?? composites[0];
  if (chosen) return chosen.bands;
  const numbers = bands.map((band) => band.number);
  return numbers.length >= 3 ? [numbers[2]!, numbers[1]!, numbers[0]!] : [numbers[0] ?? 1];
}

/** The id of the composite a view really shows on this scene. */
export function shownCompositeId(bands: readonly Band[], view: SceneView): string {
  const shown = viewBands(bands, view).join();
  if (view.compositeId === CUSTOM_COMPOSITE && view.customBands?.join() === shown) return CUSTOM_COMPOSITE;
  return sceneComposites(bands).find((composite) => composite.bands.join() === shown)?.id ?? CUSTOM_COMPOSITE;
}

/** Stored values drawn darkest and brightest, by band number, where they were set by hand. */
export type BandLimits = Readonly<Record<number, { low: number; high: number }>>;

/** The stored values a band is drawn from and to. */
export function bandLimits(band: Band, stretch: Stretch, byHand: BandLimits = {}): { low: number; high: number } {
  const set = byHand[band.number];
  if (set) return set;
  const low = bandPercentile(band.statistics, stretch.lowPercent);
  const high = bandPercentile(band.statistics, stretch.highPercent);
  // A band of one value has no width to stretch.
  return { low, high: high > low ? high : low + 1 };
}

/** Tile address of a scene for Leaflet, with {z}, {x}, {y} left in; the content key in it makes browsers keep tiles long. */
export function sceneTileUrl(
  scene: Pick<Scene, 'id' | 'bands' | 'contentKey'>,
  view: SceneView,
  byHand: BandLimits = {},
): string {
  const numbers = viewBands(scene.bands, view);
  const stretch = numbers.map((number) => {
    const band = scene.bands.find((one) => one.number === number);
    if (!band) return '0:1';
    const { low, high } = bandLimits(band, view.stretch, byHand);
    return `${shortNumber(low)}:${shortNumber(high)}`;
  });
  const query = [
    `bands=${numbers.join(',')}`,
    `stretch=${stretch.join(',')}`,
    `gamma=${Number(view.stretch.gamma.toFixed(2))}`,
    `v=${encodeURIComponent(scene.contentKey)}`,
  ];
  return `${API_BASE}/scenes/${scene.id}/tiles/{z}/{x}/{y}.webp?${query.join('&')}`;
}

/** Six digits: far finer than a screen's 256 steps, and the same address for the same view. */
function shortNumber(value: number): string {
  return String(Number(value.toPrecision(6)));
}
