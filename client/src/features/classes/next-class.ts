import { CLASS_PALETTE, classPaletteStep } from '../../../../shared/constants/class-palette.ts';
import { MAX_CLASS_CODE, MIN_CLASS_CODE } from '../../../../shared/constants/class-codes.ts';
import type { LandClass } from '../../../../shared/contracts/land-class.ts';

/** The code after the highest one in use, or the lowest free one when that is taken; null when all 254 are. */
export function nextFreeCode(classes: readonly Pick<LandClass, 'code'>[]): number | null {
  const used = new Set(classes.map(({ code }) => code));
  const after = Math.max(MIN_CLASS_CODE - 1, ...used) + 1;
  if (after <= MAX_CLASS_CODE) return after;
  for (let code = MIN_CLASS_CODE; code <= MAX_CLASS_CODE; code += 1) if (!used.has(code)) return code;
  return null;
}

/** The first palette colour no class has, or the one of its place when all ten are taken. */
export function nextFreeColour(classes: readonly Pick<LandClass, 'colour'>[]): string {
  const used = new Set(classes.map(({ colour }) => colour.toLowerCase()));
  const free = CLASS_PALETTE.find(({ colour }) => !used.has(colour.toLowerCase()));
  return (free ?? classPaletteStep(classes.length)).colour;
}
