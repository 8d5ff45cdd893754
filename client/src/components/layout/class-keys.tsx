import { classNames } from '../../lib/class-names.ts';
import { formatNumber } from '../../lib/format.ts';
import { ClassSwatch } from '../ui/class-swatch.tsx';
import { TargetBar } from '../ui/progress-bar.tsx';

export interface ClassKey {
  id: string;
  name: string;
  colour: string;
  /** Place in the scheme, from 0. */
  position: number;
  count: number;
}

export interface ClassKeysProps {
  keys: readonly ClassKey[];
  /** Samples wanted a class; null when no target was set. */
  target: number | null;
  selectedId: string | null;
  onSelect: (id: string) => void;
  /** What pressing a key does: "Class to draw". */
  label?: string;
}

/** The digit of a class by its place: 1–9, then 0; null from the eleventh on. */
export function classDigit(position: number): string | null {
  return position < 10 ? String((position + 1) % 10) : null;
}

const WIDEST_KEY_PIXELS = 190;

/** The classes as keys: digit, swatch, name and tally against the target. Bind the digits with useKeys and classDigit. */
export function ClassKeys({ keys, target, selectedId, onSelect, label = 'Class to draw' }: ClassKeysProps) {
  return (
    <div
      role="group"
      aria-label={label}
      // A scheme of two or three classes does not need keys as wide as the map.
      style={{ maxWidth: `${keys.length * WIDEST_KEY_PIXELS}px` }}
      className="grid auto-cols-[minmax(72px,1fr)] grid-flow-col divide-x divide-line overflow-x-auto"
    >
      {keys.map((key) => {
        const digit = classDigit(key.position);
        const isOn = key.id === selectedId;
        return (
          <button
            key={key.id}
            type="button"
            aria-pressed={isOn}
            aria-keyshortcuts={digit ?? undefined}
            onClick={() => onSelect(key.id)}
            className={classNames(
              'focus-inset flex flex-col px-2 pt-2 pb-2.5 text-left text-xs leading-tight max-lg:px-1 max-lg:text-2xs',
              isOn ? 'bg-groundsel-wash shadow-[inset_0_3px_0_var(--groundsel)]' : 'hover:bg-sunken',
            )}
          >
            <span className="mb-1.5 flex items-center gap-1.5 text-2xs text-ink-soft">
              {digit}
              <ClassSwatch colour={key.colour} position={key.position} size="key" />
            </span>
            <span className="min-h-[30px] font-medium break-words hyphens-auto">{key.name}</span>
            <span className="text-2xs text-ink-soft">
              {formatNumber(key.count)}
              {target !== null && ` of ${formatNumber(target)}`}
            </span>
            {target !== null && <TargetBar className="mt-1.5 w-full" done={key.count} target={target} />}
          </button>
        );
      })}
    </div>
  );
}
