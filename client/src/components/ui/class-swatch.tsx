import { useId } from 'react';
import { type ClassPattern, classPaletteStep } from '../../../../shared/constants/class-palette.ts';
import { classNames } from '../../lib/class-names.ts';
import { ClassPatternDef } from './class-pattern.tsx';

export interface ClassSwatchProps {
  colour: string;
  /** The class's place in the scheme, from 0: gives its pattern. */
  position?: number;
  /** Overrides the pattern of the position; null draws the colour alone. */
  pattern?: ClassPattern | null;
  size?: 'sm' | 'md' | 'key';
  className?: string;
}

const SIZE = {
  sm: { width: 12, height: 12, radius: 3 },
  md: { width: 16, height: 16, radius: 4 },
  key: { width: 22, height: 14, radius: 3 },
};

/** A class's colour with its pattern, always beside the class's name (it says nothing by itself). */
export function ClassSwatch({ colour, position, pattern, size = 'md', className }: ClassSwatchProps) {
  const id = useId();
  const { width, height, radius } = SIZE[size];
  const drawn = pattern === undefined && position !== undefined ? classPaletteStep(position).pattern : pattern;
  return (
    <svg
      aria-hidden
      width={width}
      height={height}
      viewBox={`0 0 ${width} ${height}`}
      className={classNames('inline-block shrink-0 align-[-2px]', className)}
    >
      {drawn && (
        <defs>
          <ClassPatternDef id={id} pattern={drawn} colour={colour} scale={size === 'sm' ? 0.6 : 0.72} />
        </defs>
      )}
      <rect
        x=".5"
        y=".5"
        width={width - 1}
        height={height - 1}
        rx={radius}
        fill={drawn ? `url(#${id})` : colour}
        stroke="var(--swatch-edge)"
      />
    </svg>
  );
}
