import { fractalNoise } from './fractal-noise.ts';
import { blockAverage, clamp, gaussianBlur } from './grid-filters.ts';
import { ISLAND_HEIGHT as H, ISLAND_PIXELS, ISLAND_WIDTH as W, PIXEL_METERS } from './island-grid.ts';
import type { IslandBand, IslandScene } from './island-types.ts';
import type { Season } from './materials.ts';
import { seededRng } from './seeded-rng.ts';
import type { Surface } from './surface.ts';

/** Digital number of pixels the sensor did not see. */
const NODATA = 0;
const REFLECTANCE_SCALE = 2.5e-5;
const REFLECTANCE_OFFSET = -0.15;
const KELVIN_SCALE = 0.004;
const KELVIN_OFFSET = 140;
const THERMAL_FACTOR = 3;
/** Blur of the optics, standard deviation in pixels. */
const OPTICS_PX = 0.56;

const REFLECTIVE = [
  { name: 'Blue', role: 'blue', wavelengthUm: 0.48, haze: 0.21, path: 0.006, noise: 0.0013 },
  { name: 'Green', role: 'green', wavelengthUm: 0.56, haze: 0.2, path: 0.003, noise: 0.0013 },
  { name: 'Red', role: 'red', wavelengthUm: 0.66, haze: 0.185, path: 0.0015, noise: 0.0013 },
  { name: 'Near infrared', role: 'nir', wavelengthUm: 0.86, haze: 0.17, path: 0.0008, noise: 0.0022 },
  { name: 'Shortwave infrared 1', role: 'swir1', wavelengthUm: 1.61, haze: 0.08, path: 0.0003, noise: 0.0018 },
  { name: 'Shortwave infrared 2', role: 'swir2', wavelengthUm: 2.2, haze: 0.05, path: 0.0002, noise: 0.0018 },
] as const;

interface Haze {
  x: number;
  y: number;
  reachX: number;
  reachY: number;
  strength: number;
}

const HAZE: Record<Season, Haze> = {
  spring: { x: 1090, y: 950, reachX: 330, reachY: 210, strength: 0.11 },
  lateSummer: { x: 90, y: 40, reachX: 390, reachY: 270, strength: 0.21 },
};

/** Thickness of the haze over each pixel, 0–1. */
function drawHaze(season: Season, seed: number): Float32Array {
  const wisps = fractalNoise(W, H, { seed, wavelengthPx: 170, roughness: 0.58, stretchX: 1.8 });
  const { x, y, reachX, reachY, strength } = HAZE[season];
  return wisps.map((v, i) => {
    const u = ((i % W) - x) / reachX;
    const w = (Math.floor(i / W) - y) / reachY;
    return clamp(Math.exp(-u * u - w * w) * strength * (1 + 0.55 * v), 0, 0.7);
  });
}

/** True where the spring swath ended: a slanted wedge at the north-east corner. */
function isBeyondSwath(x: number, y: number): boolean {
  return x + 0.5 > 1108 + 0.21 * y;
}

function toDn(value: number, scale: number, offset: number): number {
  return clamp(Math.round((value - offset) / scale), 1, 65535);
}

/** Takes the picture: haze, optics, detector noise and stripes, then whole digital numbers. */
export function takeScene(season: Season, name: string, acquiredOn: string, surface: Surface): IslandScene {
  const seed = season === 'spring' ? 301 : 302;
  const rng = seededRng(seed);
  const haze = drawHaze(season, seed);
  const hasWedge = season === 'spring';
  const bands: IslandBand[] = REFLECTIVE.map((band, b) => {
    const sharp = surface.reflectance[b];
    const hazy = sharp.map((r, i) => r * (1 - 0.75 * haze[i]) + band.path + band.haze * haze[i]);
    const seen = gaussianBlur(hazy, W, H, OPTICS_PX);
    const stripes = Float32Array.from({ length: W }, () => rng.normal() * 0.00015);
    const dn = new Uint16Array(ISLAND_PIXELS);
    for (let i = 0; i < ISLAND_PIXELS; i++) {
      const x = i % W;
      // Photon noise grows with the square root of the signal.
      const noise = rng.normal() * band.noise * Math.sqrt(0.55 + 4.5 * Math.max(0, seen[i])) + stripes[x];
      const outside = hasWedge && isBeyondSwath(x, Math.floor(i / W));
      dn[i] = outside ? NODATA : toDn(seen[i] + noise, REFLECTANCE_SCALE, REFLECTANCE_OFFSET);
    }
    return {
      name: band.name,
      role: band.role,
      wavelengthUm: band.wavelengthUm,
      gsdMeters: PIXEL_METERS,
      width: W,
      height: H,
      dn,
      scale: REFLECTANCE_SCALE,
      offset: REFLECTANCE_OFFSET,
      nodata: NODATA,
    };
  });

  const veiled = surface.temperature.map((t, i) => t - 9 * haze[i]);
  const footprint = blockAverage(gaussianBlur(veiled, W, H, 1.2), W, H, THERMAL_FACTOR);
  const dn = Uint16Array.from(footprint.values, (kelvin, i) => {
    const noisy = kelvin + rng.normal() * 0.12;
    const x = (i % footprint.width) * THERMAL_FACTOR + 1;
    const y = Math.floor(i / footprint.width) * THERMAL_FACTOR + 1;
    return hasWedge && isBeyondSwath(x, y) ? NODATA : toDn(noisy, KELVIN_SCALE, KELVIN_OFFSET);
  });
  bands.push({
    name: 'Thermal',
    role: 'thermal',
    wavelengthUm: 10.9,
    gsdMeters: PIXEL_METERS * THERMAL_FACTOR,
    width: footprint.width,
    height: footprint.height,
    dn,
    scale: KELVIN_SCALE,
    offset: KELVIN_OFFSET,
    nodata: NODATA,
  });
  return { name, acquiredOn, bands };
}
