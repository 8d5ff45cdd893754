import { createBandArray, type BandArray, type BandDtype } from '../../server/raster/band-dtype.ts';

/** Seeded uniform numbers in 0…1 (mulberry32, public domain, T. Ettinger). */
export function createRandom(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = Math.imul(state ^ (state >>> 15), 1 | state);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
}

/**
 * An invented band: fields with edges, relief shading and sensor noise, row-major, uint16 DN about 7,000–16,000
 * (float types: the same over 10,000; uint8: a class code 1–10 a field).
 */
export function makeSyntheticBand(width: number, height: number, dtype: BandDtype, seed: number): BandArray {
  const random = createRandom(seed);
  const out = createBandArray(dtype, width * height);
  const fieldSide = 37;
  const fieldColumns = Math.ceil(width / fieldSide) + 1;
  const fieldLevels = Float64Array.from({ length: fieldColumns * (Math.ceil(height / fieldSide) + 1) }, random);
  for (let row = 0; row < height; row++) {
    for (let col = 0; col < width; col++) {
      const slantedCol = (col + row * 0.2) % width;
      const field = Math.floor(row / fieldSide) * fieldColumns + Math.floor(slantedCol / fieldSide);
      const level = fieldLevels[field];
      if (dtype === 'uint8') {
        out[row * width + col] = 1 + Math.floor(level * 10);
        continue;
      }
      const relief = Math.sin(col / 210 + seed) * Math.cos(row / 170) + 0.4 * Math.sin((col + row) / 45);
      const noise = (random() + random() + random() - 1.5) * 110;
      const dn = 9500 + level * 5000 + relief * 900 + noise;
      out[row * width + col] = dtype.startsWith('float') ? dn / 10000 : Math.round(dn);
    }
  }
  return out;
}
