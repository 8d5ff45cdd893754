import { Images } from 'lucide-react';
import { Button } from '../ui/button.tsx';
import { Checkbox } from '../ui/checkbox.tsx';
import { Popover } from '../ui/popover.tsx';
import type { ContextView } from './context-choice.ts';

export interface ViewPickerProps {
  views: readonly ContextView[];
  hidden: ReadonlySet<string>;
  onChange: (hidden: ReadonlySet<string>) => void;
}

/** Which pictures of a place are shown; remembered in this browser. */
export function ViewPicker({ views, hidden, onChange }: ViewPickerProps) {
  const nShown = views.length - hidden.size;
  const set = (id: string, isShown: boolean) => {
    const next = new Set(hidden);
    if (isShown) next.delete(id);
    else next.add(id);
    onChange(next);
  };
  return (
    <Popover
      label="Pictures shown"
      trigger={
        <Button size="sm" icon={<Images aria-hidden />}>
          Pictures
        </Button>
      }
    >
      <div className="space-y-1.5">
        {views.map(({ id, composite, scene }) => (
          <Checkbox
            key={id}
            label={`${composite}, ${scene.name}`}
            isChecked={!hidden.has(id)}
            isDisabled={!hidden.has(id) && nShown === 1}
            onChange={(isShown) => set(id, isShown)}
          />
        ))}
      </div>
    </Popover>
  );
}
