import { CONTEXT_KEY_NAMES } from '../../components/place/use-context-views.ts';
import { Dialog } from '../../components/ui/dialog.tsx';
import { Kbd } from '../../components/ui/kbd.tsx';

type KeyNames = readonly (readonly [readonly string[], string])[];

const NAMING: KeyNames = [
  [['1', '…', '9', '0'], 'Class, in the order of the list'],
  [['PgDn', 'PgUp'], 'The digits stand for the next or the previous ten classes'],
  [['A'], 'The next digit is the second choice; again for the class'],
];
const NOTE: KeyNames = [[['N'], 'Write a note; Esc leaves it']];
const CHECK: KeyNames = [
  ...NAMING,
  [['C'], 'Confidence: unsure, fairly sure, sure, and round'],
  ...NOTE,
  [['Enter'], 'Save and go on'],
  [['S'], 'Skip: the point comes again at the end'],
  [['←'], 'The point before'],
  [['→'], 'The point after'],
  ...CONTEXT_KEY_NAMES,
  [['?'], 'This list'],
];
const DECISIONS: KeyNames = [
  ...NAMING,
  ...NOTE,
  [['Enter'], 'Decide and go on to the next point to decide'],
  [['←', '↑'], 'The point before'],
  [['→', '↓'], 'The point after'],
  ...CONTEXT_KEY_NAMES,
  [['?'], 'This list'],
];

export interface InterpretationKeysProps {
  of: 'check' | 'decisions';
  onClose: () => void;
}

/** Every key of the blind check, or of the decisions. */
export function InterpretationKeys({ of, onClose }: InterpretationKeysProps) {
  return (
    <Dialog
      isOpen
      onOpenChange={(isOpen) => !isOpen && onClose()}
      title={of === 'check' ? 'Keys of the blind check' : 'Keys of the decisions'}
    >
      <dl className="grid grid-cols-[auto_1fr] items-baseline gap-x-4 gap-y-2">
        {(of === 'check' ? CHECK : DECISIONS).map(([keys, text]) => (
          <div key={text} className="contents">
            <dt className="flex gap-1">
              {keys.map((key) => (
                <Kbd key={key}>{key}</Kbd>
              ))}
            </dt>
            <dd>{text}</dd>
          </div>
        ))}
      </dl>
    </Dialog>
  );
}
