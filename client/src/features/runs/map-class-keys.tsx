import { classDigit } from '../../components/layout/class-keys.tsx';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import { classNames } from '../../lib/class-names.ts';

interface MapClassKeysProps {
  classes: readonly { id: string; name: string; colour: string; position: number }[];
  hidden: ReadonlySet<string>;
  onToggle: (id: string) => void;
  onShowAll: () => void;
}

/** The classes of the map as keys that hide and show each; bind the digits with useKeys and classDigit. */
export function MapClassKeys({ classes, hidden, onToggle, onShowAll }: MapClassKeysProps) {
  return (
    <div role="group" aria-label="Classes shown" className="flex items-stretch overflow-x-auto border-t border-line">
      {classes.map(({ id, name, colour, position }, index) => {
        const digit = classDigit(index);
        const isShown = !hidden.has(id);
        return (
          <button
            key={id}
            type="button"
            aria-pressed={isShown}
            aria-keyshortcuts={digit ?? undefined}
            onClick={() => onToggle(id)}
            className={classNames(
              'focus-inset flex min-w-18 grow basis-0 flex-col gap-1 border-r border-line px-2 py-1.5 text-left text-2xs leading-tight last:border-r-0 hover:bg-sunken',
              !isShown && 'text-ink-soft line-through',
            )}
          >
            <span className="flex items-center gap-1.5 text-ink-soft no-underline">
              {digit}
              <span className={isShown ? '' : 'opacity-30'}>
                <ClassSwatch colour={colour} position={position} size="key" />
              </span>
            </span>
            <span className="break-words hyphens-auto">{name}</span>
          </button>
        );
      })}
      {hidden.size > 0 && (
        <button
          type="button"
          onClick={onShowAll}
          className="focus-inset shrink-0 px-3 text-xs font-medium hover:bg-sunken"
        >
          Show all
        </button>
      )}
    </div>
  );
}
