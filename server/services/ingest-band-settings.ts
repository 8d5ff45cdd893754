import type { BandQuantity, BandRole } from '../../shared/constants/bands.ts';
import { truePixelAreaM2 } from '../analysis/sampling/ellipsoidal-area.ts';
import { getCrsTransform } from '../raster/crs-transform.ts';
import type { SourceInfo } from '../raster/inspect-source.ts';
import { pixelToMap, type RasterGrid } from '../raster/raster-grid.ts';

/** What a file says of one of its bands. */
export interface DescribedBand {
  description: string;
  /** Name of the file without its ending, where the file has no other band. */
  fileStem: string | null;
  colorInterp: string;
  dtype: string;
  scale: number;
  offset: number;
  /** Whether the band stands on the scene's own grid. */
  isOnSceneGrid: boolean;
  /** 2nd and 98th percentile of the stored values. */
  p2: number;
  p98: number;
}

export interface BandSettings {
  name: string;
  role: BandRole;
  centreWavelengthUm: number | null;
  quantity: BandQuantity;
}

/** In this order: the first that fits counts, so what names another role in part comes first. */
const ROLE_WORDS: readonly [RegExp, BandRole][] = [
  [/\bcoastal\b|\baerosol\b/, 'coastal'],
  [/\bred ?edge\b|\bvegetation red ?edge\b/, 'red-edge'],
  [/\bnear ?infra ?red\b|\bnir\b|\bvnir\b/, 'nir'],
  [/\bcirrus\b/, 'cirrus'],
  [/\b(swir|short ?wave ?infra ?red|short ?wave) ?(1|i)\b|\b1\.6\d* ?(um|µm|μm)/, 'swir1'],
  [/\b(swir|short ?wave ?infra ?red|short ?wave) ?(2|ii)\b|\b2\.[12]\d* ?(um|µm|μm)/, 'swir2'],
  [/\bthermal\b|\btir\b|\btirs\b|\bbrightness temperature\b|\bsurface temperature\b|\blwir\b/, 'thermal'],
  [/\bpan\b|\bpanchromatic\b/, 'pan'],
  [/\belevation\b|\bdem\b|\bdtm\b|\bdsm\b|\bheight\b/, 'elevation'],
  [/\bblue\b/, 'blue'],
  [/\bgreen\b/, 'green'],
  [/\bred\b/, 'red'],
];

/** The order in which instruments with four or six reflective bands commonly deliver them; common practice, no source. */
const GUESSES: Record<number, readonly BandRole[]> = {
  4: ['blue', 'green', 'red', 'nir'],
  6: ['blue', 'green', 'red', 'nir', 'swir1', 'swir2'],
};

/** The role that a band's description names, "other" when it names none. */
export function readRole(description: string): BandRole {
  const words = description.toLowerCase().replace(/[_-]+/g, ' ');
  return ROLE_WORDS.find(([pattern]) => pattern.test(words))?.[1] ?? 'other';
}

/** A centre wavelength in µm that a description states with its unit: "red 0.66 µm", "665 nm". */
export function readWavelengthUm(description: string): number | null {
  const match = /(\d+(?:\.\d+)?)\s*(nm|nanomet(?:er|re)s?|[uµμ]m|micromet(?:er|re)s?|microns?)(?![a-z])/i.exec(
    description,
  );
  if (!match) return null;
  const value = Number(match[1]) / (/^n/i.test(match[2] ?? '') ? 1000 : 1);
  return value > 0 && value <= 1000 ? value : null;
}

/**
 * Fills a band table from what the files say. Roles come from descriptions, from single-band files' names and from a full
 * set of red, green and blue screen channels; only where nothing is said at all are the roles of four or six integer bands guessed
 * from their number, so that a natural-colour composite shows at once.
 */
export function fillBandSettings(bands: readonly DescribedBand[]): { settings: BandSettings[]; guessedRoles: boolean } {
  const texts = bands.map(({ description, fileStem }) => description.trim() || fileStem || '');
  const roles: BandRole[] = texts.map(readRole);
  const channels = ['Red', 'Green', 'Blue'].map((name) => bands.filter((band) => band.colorInterp === name));
  const isUnsaid =
    texts.every((text) => readRole(text) === 'other') && bands.every((band) => band.description.trim() === '');
  let guessedRoles = false;
  if (isUnsaid && channels.every((channel) => channel.length === 1)) {
    bands.forEach(({ colorInterp }, i) => (roles[i] = readRole(colorInterp)));
  } else if (isUnsaid) {
    const own = bands.flatMap((band, i) => (band.isOnSceneGrid ? [i] : []));
    const guess = own.every((i) => /^uint(8|16)$/.test(bands[i]?.dtype ?? '')) ? GUESSES[own.length] : undefined;
    guess?.forEach((role, place) => (roles[own[place] ?? 0] = role));
    guessedRoles = guess !== undefined;
  }
  const settings = bands.map((band, i): BandSettings => {
    const role = roles[i] ?? 'other';
    return {
      name: (texts[i] || `Band ${i + 1}`).slice(0, 80),
      role,
      centreWavelengthUm: readWavelengthUm(texts[i] ?? ''),
      quantity: readQuantity(band, role),
    };
  });
  return { settings, guessedRoles };
}

/** A quantity is taken from a declared scale only where the scaled values can be that quantity. */
function readQuantity({ scale, offset, p2, p98 }: DescribedBand, role: BandRole): BandQuantity {
  if (scale === 1 && offset === 0) return 'digital number';
  const [low, high] = [p2 * scale + offset, p98 * scale + offset].sort((a, b) => a - b) as [number, number];
  if (role === 'thermal') return low > 150 && high < 400 ? 'kelvin' : 'digital number';
  return role !== 'elevation' && low > -0.5 && high < 2 ? 'reflectance' : 'digital number';
}

/** Side of a pixel on the ground in metres: the pixel size of a metric grid, else the root of the true area in the grid's middle. */
export function measureGsdMeters(info: Pick<SourceInfo, 'crs'>, grid: RasterGrid): number | null {
  if (info.crs.unit === 'metre') return round(Math.max(grid.pixelWidth, grid.pixelHeight));
  const transform = getCrsTransform(info.crs.proj4);
  const column = Math.floor(grid.width / 2);
  const row = Math.floor(grid.height / 2);
  const corners = [
    [column, row],
    [column, row + 1],
    [column + 1, row + 1],
    [column + 1, row],
  ].map(([c = 0, r = 0]) => transform.toLonLat(...pixelToMap(grid, c, r)));
  const isPlaced = corners.every(([lon, lat]) => Number.isFinite(lon) && Number.isFinite(lat));
  return isPlaced ? round(Math.sqrt(truePixelAreaM2(corners))) : null;
}

function round(meters: number): number {
  return Number(meters.toPrecision(6));
}
