import { Plus } from 'lucide-react';
import { Button } from '../../components/ui/button.tsx';
import { Menu, MenuItem } from '../../components/ui/menu.tsx';
import { STEP_HINTS, STEP_NAMES, type StepKind } from './step-text.ts';

interface AddStepMenuProps {
  /** Kinds that cannot be used here, such as a mask where there is none. */
  without: readonly StepKind[];
  onAdd: (kind: StepKind) => void;
}

const KINDS: readonly StepKind[] = ['majority', 'sieve', 'recode', 'fill', 'reclass'];

/** Kinds of steps with a word on what each does. */
export function AddStepMenu({ without, onAdd }: AddStepMenuProps) {
  return (
    <Menu
      align="start"
      trigger={
        <Button size="sm" icon={<Plus />}>
          Add step
        </Button>
      }
    >
      {KINDS.filter((kind) => !without.includes(kind)).map((kind) => (
        <MenuItem key={kind} onSelect={() => onAdd(kind)}>
          <span className="block font-medium">{STEP_NAMES[kind]}</span>
          <span className="block text-xs text-ink-soft">{STEP_HINTS[kind]}</span>
        </MenuItem>
      ))}
    </Menu>
  );
}
