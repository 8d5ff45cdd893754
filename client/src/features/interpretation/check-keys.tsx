import { Dialog } from '../../components/ui/dialog.tsx';
import { Kbd } from '../../components/ui/kbd.tsx';

const KEYS: readonly [string[], string][] = [
  [['1', '…', '9', '0'], 'Class, in the order of the list'],
  [['PgDn', 'PgUp'], 'The digits stand for the next or the previous ten classes'],
  [['A'], 'The next digit is the second choice; again for the class'],
  [['C'], 'Confidence: unsure, fairly sure, sure, and round'],
  [['N'], 'Write a note; Esc leaves it'],
  [['Enter'], 'Save and go on'],
  [['S'], 'Skip: the point comes again at the end'],
  [['←'], 'The point before'],
  [['→'], 'The point after'],
  [['+', '−'], 'Closer, farther'],
  [['?'], 'This list'],
];

/** Every key of the blind check. */
export function CheckKeys({ onClose }: { onClose: () => void }) {
  return (
    <Dialog isOpen onOpenChange={(isOpen) => !isOpen && onClose()} title="Keys of the blind check">
      <dl className="grid grid-cols-[auto_1fr] items-baseline gap-x-4 gap-y-2">
        {KEYS.map(([keys, text]) => (
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
