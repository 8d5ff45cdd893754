import type { How } from '../../../../shared/contracts/reference.ts';
import { formatNumber } from '../../lib/format.ts';
import { toCsv } from '../../lib/csv.ts';
import { fileNameOf, saveFile } from '../../lib/save-file.ts';
import { Button } from '../ui/button.tsx';
import { Popover } from '../ui/popover.tsx';

export interface HowComputedProps {
  /** The figure: "Overall accuracy". */
  name: string;
  how: How;
  /** What opens it; the figure itself where left out. */
  trigger: string;
}

/** Opens formula, source and inputs of a figure; the inputs can be saved. */
export function HowComputed({ name, how, trigger }: HowComputedProps) {
  const save = () =>
    saveFile(
      `${fileNameOf(name)}-inputs.csv`,
      toCsv(
        ['input', 'value'],
        how.inputs.map((input) => [input.name, input.value]),
      ),
      'text/csv',
    );
  return (
    <Popover
      label={`How ${name} was computed`}
      className="max-h-[min(26rem,var(--radix-popover-content-available-height))] overflow-y-auto"
      trigger={
        <button
          type="button"
          className="link text-left font-[inherit] text-[inherit]!"
          aria-label={`${name}, how was this computed?`}
        >
          {trigger}
        </button>
      }
    >
      <p className="font-medium">{name}</p>
      <p className="mt-1 font-mono text-xs whitespace-pre-wrap">{how.formula}</p>
      <p className="mt-1 text-xs text-ink-soft">{how.source}</p>
      {how.inputs.length > 0 && (
        <dl className="mt-2 grid grid-cols-[1fr_auto] gap-x-4 gap-y-0.5 border-t border-line pt-2 text-xs">
          {how.inputs.map((input) => (
            <div key={input.name} className="contents">
              <dt className="text-ink-soft">{input.name}</dt>
              <dd className="text-right">{formatInput(input.value)}</dd>
            </div>
          ))}
        </dl>
      )}
      <Button size="sm" className="mt-2" onClick={save}>
        Save inputs as CSV
      </Button>
    </Popover>
  );
}

function formatInput(value: string | number | null): string {
  if (value === null) return 'undefined';
  if (typeof value === 'string') return value;
  return Number.isInteger(value) ? formatNumber(value) : String(Number(value.toPrecision(6)));
}
