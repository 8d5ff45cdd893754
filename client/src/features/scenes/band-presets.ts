import type { Instrument, InstrumentBand } from '../../../../shared/constants/instrument-bands.ts';
import type { ValueScale } from '../../../../shared/constants/value-scales.ts';
import type { BandValues } from './scene-values.ts';

/** What a preset made of the band table. */
export interface PresetResult {
  bands: BandValues[];
  nChanged: number;
  /** Numbers (from 1) of bands the preset has nothing for. */
  leftNumbers: number[];
}

/**
 * Fills wavelength and ground sample distance by an instrument's bands. A band is found by the code in its name ("B5",
 * "SR_B05", "band 5"), and then takes the role too; else by its role, where the instrument has one band of that role.
 */
export function fillFromInstrument(bands: readonly BandValues[], { bands: known }: Instrument): PresetResult {
  return fill(bands, (band) => {
    const named = bandNamed(band.name, known);
    const found = named ?? onlyBandOfRole(band, bands, known);
    if (!found) return null;
    const { role, centreWavelengthUm, gsdMeters } = found;
    return { ...band, ...(named && { role }), centreWavelengthUm, gsdMeters };
  });
}

/** Sets scale, offset and quantity on the bands whose role the product's scale is meant for. */
export function applyValueScale(bands: readonly BandValues[], preset: ValueScale): PresetResult {
  const { scale, offset, quantity, roles } = preset;
  return fill(bands, (band) => (roles.includes(band.role) ? { ...band, scale, offset, quantity } : null));
}

function fill(bands: readonly BandValues[], change: (band: BandValues) => BandValues | null): PresetResult {
  const leftNumbers: number[] = [];
  let nChanged = 0;
  const filled = bands.map((band, index) => {
    const next = change(band);
    if (!next) leftNumbers.push(index + 1);
    else nChanged += 1;
    return next ?? band;
  });
  return { bands: filled, nChanged, leftNumbers };
}

/** The instrument's band whose code the name carries as a word of its own: "B8A", "SR_B5", "band 10". */
function bandNamed(name: string, known: readonly InstrumentBand[]): InstrumentBand | null {
  const match = /(?:^|[^a-z])b(?:and)?[\s_-]?0*(\d{1,2}a?)(?![a-z\d])/i.exec(name);
  const code = match?.[1]?.toUpperCase();
  return known.find((band) => band.code === code) ?? null;
}

/** By role only where it is plain which band is meant: one in the scene, or as many as the instrument has, in order. */
function onlyBandOfRole(
  band: BandValues,
  bands: readonly BandValues[],
  known: readonly InstrumentBand[],
): InstrumentBand | null {
  if (band.role === 'other') return null;
  const candidates = known.filter(({ role }) => role === band.role);
  const same = bands.filter(({ role }) => role === band.role);
  if (candidates.length === 1) return candidates[0] ?? null;
  // Two infrared or thermal bands and one in the scene: the first is the one that is commonly mapped with.
  if (same.length === 1 && band.role !== 'red-edge') return candidates[0] ?? null;
  return same.length === candidates.length ? (candidates[same.indexOf(band)] ?? null) : null;
}
