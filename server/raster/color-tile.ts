import type { SampledBand } from './sample-band.ts';
import type { Stretch, TileColor } from './tile-request.ts';

const nSteps = 1024;

/** Brightness 0–255 for each of 1,024 steps through a stretch. */
function buildGammaTable(gamma: number): Uint8Array {
  const table = new Uint8Array(nSteps);
  for (let step = 0; step < nSteps; step++) table[step] = Math.round(255 * (step / (nSteps - 1)) ** (1 / gamma));
  return table;
}

/** Step of a value within a stretch; a stretch without width puts everything above it at full brightness. */
function findStep(value: number, low: number, perUnit: number): number {
  const step = (value - low) * perUnit;
  return step <= 0 ? 0 : step >= nSteps - 1 ? nSteps - 1 : Math.round(step);
}

function getStepsPerUnit([low, high]: Stretch): number {
  return high > low ? (nSteps - 1) / (high - low) : Number.MAX_VALUE;
}

/** Three bands as red, green and blue; a pixel shows only where all three have data. Returns the number shown. */
export function colorComposite(
  [red, green, blue]: [SampledBand, SampledBand, SampledBand],
  stretch: [Stretch, Stretch, Stretch],
  gamma: number,
  rgba: Uint8Array,
): number {
  const table = buildGammaTable(gamma);
  const [redPerUnit, greenPerUnit, bluePerUnit] = stretch.map(getStepsPerUnit);
  const [[redLow], [greenLow], [blueLow]] = stretch;
  let nShown = 0;
  for (let i = 0, at = 0; i < red.values.length; i++, at += 4) {
    if ((red.isValid[i] & green.isValid[i] & blue.isValid[i]) === 0) continue;
    rgba[at] = table[findStep(red.values[i], redLow, redPerUnit)];
    rgba[at + 1] = table[findStep(green.values[i], greenLow, greenPerUnit)];
    rgba[at + 2] = table[findStep(blue.values[i], blueLow, bluePerUnit)];
    rgba[at + 3] = 255;
    nShown++;
  }
  return nShown;
}

const greyRamp: TileColor[] = [
  [0, 0, 0, 255],
  [255, 255, 255, 255],
];

/** One band through a ramp of evenly spaced colours, grey where none is given. Returns the number of pixels shown. */
export function colorSingle(
  band: SampledBand,
  stretch: Stretch,
  gamma: number,
  ramp: TileColor[] | undefined,
  rgba: Uint8Array,
): number {
  const colors = buildRampTable(ramp === undefined || ramp.length < 2 ? greyRamp : ramp, gamma);
  const perUnit = getStepsPerUnit(stretch);
  let nShown = 0;
  for (let i = 0, at = 0; i < band.values.length; i++, at += 4) {
    if (band.isValid[i] === 0) continue;
    const from = findStep(band.values[i], stretch[0], perUnit) * 4;
    rgba[at] = colors[from];
    rgba[at + 1] = colors[from + 1];
    rgba[at + 2] = colors[from + 2];
    rgba[at + 3] = colors[from + 3];
    nShown++;
  }
  return nShown;
}

function buildRampTable(ramp: readonly TileColor[], gamma: number): Uint8Array {
  const table = new Uint8Array(nSteps * 4);
  for (let step = 0; step < nSteps; step++) {
    const place = (step / (nSteps - 1)) ** (1 / gamma) * (ramp.length - 1);
    const lower = Math.min(ramp.length - 2, Math.floor(place));
    const share = place - lower;
    for (let channel = 0; channel < 4; channel++) {
      table[step * 4 + channel] = Math.round(ramp[lower][channel] * (1 - share) + ramp[lower + 1][channel] * share);
    }
  }
  return table;
}

/** Class codes in the colours of a palette; a code without a colour is transparent, codes are 0–255. Returns the number of pixels shown. */
export function colorClasses(band: SampledBand, palette: readonly [number, TileColor][], rgba: Uint8Array): number {
  const table = new Uint8Array(256 * 4);
  for (const [code, color] of palette) table.set(color, code * 4);
  let nShown = 0;
  for (let i = 0, at = 0; i < band.values.length; i++, at += 4) {
    if (band.isValid[i] === 0) continue;
    const from = band.values[i] * 4;
    if (table[from + 3] === 0) continue;
    rgba[at] = table[from];
    rgba[at + 1] = table[from + 1];
    rgba[at + 2] = table[from + 2];
    rgba[at + 3] = table[from + 3];
    nShown++;
  }
  return nShown;
}
