import { MoveHorizontal } from 'lucide-react';
import { useRef } from 'react';

export interface SwipeDividerProps {
  share: number;
  onChange: (share: number) => void;
  /** What lies on either side, read out and shown at the foot: "Run 2". */
  leftName: string;
  rightName: string;
}

const STEP = 0.02;
const LONG_STEP = 0.1;

/** The line between two pictures of one place: dragged, or moved with the arrow keys. */
export function SwipeDivider({ share, onChange, leftName, rightName }: SwipeDividerProps) {
  const frame = useRef<HTMLDivElement>(null);
  const move = (clientX: number) => {
    const box = frame.current?.getBoundingClientRect();
    if (box && box.width > 0) onChange(clamp((clientX - box.left) / box.width));
  };
  const percent = Math.round(share * 100);
  return (
    <div ref={frame} className="pointer-events-none absolute inset-0 z-[1005] overflow-hidden">
      <span
        className="absolute top-14 max-w-56 -translate-x-full truncate rounded bg-card px-2 py-0.5 text-xs shadow-lift"
        style={{ left: `calc(${percent}% - 24px)` }}
        aria-hidden
      >
        {leftName}
      </span>
      <span
        className="absolute top-14 max-w-56 truncate rounded bg-card px-2 py-0.5 text-xs shadow-lift"
        style={{ left: `calc(${percent}% + 24px)` }}
        aria-hidden
      >
        {rightName}
      </span>
      <div
        role="slider"
        tabIndex={0}
        aria-label={`Divider between ${leftName} and ${rightName}`}
        aria-orientation="horizontal"
        aria-valuemin={0}
        aria-valuemax={100}
        aria-valuenow={percent}
        aria-valuetext={`${percent} % of the width shows ${leftName}`}
        style={{ left: `${share * 100}%` }}
        className="pointer-events-auto absolute inset-y-0 w-6 -translate-x-1/2 cursor-ew-resize touch-none"
        onPointerDown={(event) => {
          event.currentTarget.setPointerCapture(event.pointerId);
          move(event.clientX);
        }}
        onPointerMove={(event) => {
          if (event.currentTarget.hasPointerCapture(event.pointerId)) move(event.clientX);
        }}
        onKeyDown={(event) => {
          const next = nextShare(share, event.key, event.shiftKey);
          if (next === null) return;
          event.preventDefault();
          event.stopPropagation();
          onChange(next);
        }}
      >
        <span className="absolute inset-y-0 left-1/2 w-[3px] -translate-x-1/2 border-x border-ink bg-card" />
        <span className="absolute top-1/3 left-1/2 flex size-8 -translate-x-1/2 items-center justify-center rounded-full border border-ink bg-card shadow-lift">
          <MoveHorizontal aria-hidden className="size-4" />
        </span>
      </div>
    </div>
  );
}

/** Where a key moves the divider; null for keys that are none of it. */
export function nextShare(share: number, key: string, isLong: boolean): number | null {
  const step = isLong ? LONG_STEP : STEP;
  if (key === 'ArrowLeft' || key === 'ArrowDown') return clamp(share - step);
  if (key === 'ArrowRight' || key === 'ArrowUp') return clamp(share + step);
  if (key === 'PageDown') return clamp(share - LONG_STEP);
  if (key === 'PageUp') return clamp(share + LONG_STEP);
  if (key === 'Home') return 0;
  if (key === 'End') return 1;
  return null;
}

function clamp(share: number): number {
  return Math.min(1, Math.max(0, Math.round(share * 1000) / 1000));
}
