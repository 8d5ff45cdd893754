/** Fill patterns that tell classes apart without colour; drawn by the client and the report. */
export const CLASS_PATTERNS = [
  'waves',
  'dots',
  'tufts',
  'rings',
  'peaks',
  'crosses',
  'diagonals',
  'furrows',
  'shards',
  'bricks',
] as const;
export type ClassPattern = (typeof CLASS_PATTERNS)[number];

export interface ClassPaletteStep {
  colour: string;
  /** What the colour is called, for people who choose by words. */
  name: string;
  pattern: ClassPattern;
}

/**
 * The ten colours a new class takes, in order. They were searched for the largest smallest CIEDE2000 distance as seen
 * with normal vision and with simulated protanopia, deuteranopia and tritanopia; tests/client/class-palette.test.ts
 * holds the distances.
 */
export const CLASS_PALETTE: readonly ClassPaletteStep[] = [
  { colour: '#294483', name: 'ink blue', pattern: 'waves' },
  { colour: '#D9CCB4', name: 'sand', pattern: 'dots' },
  { colour: '#299785', name: 'sea green', pattern: 'tufts' },
  { colour: '#41702B', name: 'leaf green', pattern: 'rings' },
  { colour: '#0B382E', name: 'bottle green', pattern: 'peaks' },
  { colour: '#A85AA4', name: 'heather', pattern: 'crosses' },
  { colour: '#C9DC67', name: 'spring green', pattern: 'diagonals' },
  { colour: '#D18543', name: 'stubble', pattern: 'furrows' },
  { colour: '#A4B1C1', name: 'slate', pattern: 'shards' },
  { colour: '#652A12', name: 'brick', pattern: 'bricks' },
];

/** The palette step of the class at `position` (from 0) of the scheme; from the eleventh on they come round again. */
export function classPaletteStep(position: number): ClassPaletteStep {
  const size = CLASS_PALETTE.length;
  return CLASS_PALETTE[((position % size) + size) % size] as ClassPaletteStep;
}
