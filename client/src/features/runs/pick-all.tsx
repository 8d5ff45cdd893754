import { Button } from '../../components/ui/button.tsx';
import { formatNumber } from '../../lib/format.ts';

interface PickAllProps {
  title: string;
  nChosen: number;
  nAll: number;
  onAll: () => void;
  onNone: () => void;
}

/** The head of a list of ticks: how many are on, and all or none at once. */
export function PickAll({ title, nChosen, nAll, onAll, onNone }: PickAllProps) {
  return (
    <div className="flex items-center gap-2">
      <p className="grow text-sm font-medium">
        {title}
        <span className="ml-1.5 font-normal text-ink-soft">
          {formatNumber(nChosen)} of {formatNumber(nAll)}
        </span>
      </p>
      <Button size="sm" kind="ghost" onClick={onAll} disabled={nChosen === nAll} aria-label={`All ${title}`}>
        All
      </Button>
      <Button size="sm" kind="ghost" onClick={onNone} disabled={nChosen === 0} aria-label={`No ${title}`}>
        None
      </Button>
    </div>
  );
}

/** What is wrong with a list of ticks. */
export function FieldFault({ text }: { text: string | undefined }) {
  if (!text) return null;
  return (
    <p role="alert" className="mt-1 text-xs font-medium text-rust">
      {text}
    </p>
  );
}
