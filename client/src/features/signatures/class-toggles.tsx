import type { SignatureSet } from '../../../../shared/contracts/signature.ts';
import { Button } from '../../components/ui/button.tsx';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import { classNames } from '../../lib/class-names.ts';

export interface ClassTogglesProps {
  classes: SignatureSet['classes'];
  shown: ReadonlySet<number>;
  onChange: (shown: ReadonlySet<number>) => void;
}

/** Which classes the charts show. */
export function ClassToggles({ classes, shown, onChange }: ClassTogglesProps) {
  const toggle = (c: number) => {
    const next = new Set(shown);
    if (!next.delete(c)) next.add(c);
    onChange(next);
  };
  return (
    <div role="group" aria-label="Classes shown" className="flex flex-wrap items-center gap-1.5">
      {classes.map((one, c) => (
        <button
          key={one.classId}
          type="button"
          aria-pressed={shown.has(c)}
          onClick={() => toggle(c)}
          className={classNames(
            'flex min-h-7 items-center gap-1.5 rounded-md border px-2 text-sm',
            shown.has(c) ? 'border-edge bg-card' : 'border-line bg-transparent text-ink-soft line-through',
          )}
        >
          <ClassSwatch size="sm" colour={one.colour} position={one.position} />
          {one.name}
        </button>
      ))}
      {shown.size < classes.length && (
        <Button size="sm" kind="ghost" onClick={() => onChange(new Set(classes.keys()))}>
          Show all
        </Button>
      )}
    </div>
  );
}
