import type { ReactElement } from 'react';
import type { ClassPattern } from '../../../../shared/constants/class-palette.ts';

/** Side of one pattern tile in SVG units. */
export const PATTERN_TILE = 12;

/** The strokes of each pattern in a 12 × 12 tile that joins itself on all sides. */
const STROKES: Record<ClassPattern, string> = {
  waves: 'M0 3q3-3 6 0t6 0M0 9q3-3 6 0t6 0',
  dots: 'M3 3h.01M9 9h.01M9 3h.01M3 9h.01',
  tufts: 'M3 8V4M1 5l2 3 2-3M9 2v-2M9 12v-2M7 11l2 3 2-3M7-1l2 3 2-3',
  rings:
    'M5.200 3a2.200 2.200 0 1 1-4.400 0 2.200 2.200 0 0 1 4.400 0ZM11.200 9a2.200 2.200 0 1 1-4.400 0 2.200 2.200 0 0 1 4.400 0Z',
  peaks: 'M1 5l2.500-4L6 5M7 11l2.500-4 2.500 4',
  crosses: 'M3 1v4M1 3h4M9 7v4M7 9h4',
  diagonals: 'M-3 9 9-3M-3 15 15-3M3 15 15 3',
  furrows: 'M0 2h12M0 6h12M0 10h12',
  shards: 'M1 6l3-5 2 4ZM7 11l1-4 4 3Z',
  bricks: 'M0 0h12M0 6h12M3 0v6M9 6v6',
};

export interface ClassPatternDefProps {
  id: string;
  pattern: ClassPattern;
  colour: string;
  /** Scale of the tile, 1 for maps and legends, less for small swatches. */
  scale?: number;
}

/** An SVG `<pattern>` of a class's colour and strokes; put it into `<defs>` and fill with `url(#id)`. */
export function ClassPatternDef({ id, pattern, colour, scale = 1 }: ClassPatternDefProps): ReactElement {
  return (
    <pattern
      id={id}
      width={PATTERN_TILE}
      height={PATTERN_TILE}
      patternUnits="userSpaceOnUse"
      patternTransform={scale === 1 ? undefined : `scale(${scale})`}
    >
      <rect width={PATTERN_TILE} height={PATTERN_TILE} fill={colour} />
      <path
        d={STROKES[pattern]}
        fill="none"
        stroke={strokeOn(colour)}
        strokeWidth={pattern === 'dots' ? 2.4 : 1.3}
        strokeLinecap="round"
        strokeLinejoin="round"
      />
    </pattern>
  );
}

/** Near-white on dark class colours, near-black on light ones, so that strokes and letters stay readable. */
export function strokeOn(colour: string): string {
  const [red = 0, green = 0, blue = 0] = [1, 3, 5].map((start) => {
    const share = parseInt(colour.slice(start, start + 2), 16) / 255;
    return share <= 0.04045 ? share / 12.92 : ((share + 0.055) / 1.055) ** 2.4;
  });
  // Relative luminance as WCAG 2.2 defines it; 0.179 is where black and white contrast equally.
  const luminance = 0.2126 * red + 0.7152 * green + 0.0722 * blue;
  return luminance > 0.179 ? '#1E2A26' : '#FFFDF8';
}
