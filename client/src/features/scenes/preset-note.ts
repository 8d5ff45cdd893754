import { formatCount } from '../../lib/format.ts';
import type { PresetResult } from './band-presets.ts';

/** What a preset did, in words: "OLI and TIRS filled 6 bands; band 7 is left as it was." */
export function presetNote(presetName: string, { nChanged, leftNumbers }: PresetResult): string {
  if (nChanged === 0) return `${presetName} fits no band here. Give the bands their roles first.`;
  const done = `${presetName} filled ${formatCount(nChanged, 'band')}`;
  if (leftNumbers.length === 0) return `${done}. Nothing is saved yet.`;
  const left = leftNumbers.length === 1 ? `band ${leftNumbers[0]} is` : `bands ${leftNumbers.join(', ')} are`;
  return `${done}; ${left} left as before. Nothing is saved yet.`;
}
