import { useId } from 'react';
import { CLASS_PALETTE } from '../../../../shared/constants/class-palette.ts';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import { INPUT_CLASS } from '../../components/ui/text-input.tsx';
import { classNames } from '../../lib/class-names.ts';

interface ColourFieldProps {
  /** #rrggbb, or what is typed so far. */
  value: string;
  onChange: (colour: string) => void;
  error?: string | undefined;
  /** Names of other classes by their colour in lower case. */
  takenBy: ReadonlyMap<string, string>;
}

/** The ten palette colours by name, and any other by picker or hex. */
export function ColourField({ value, onChange, error, takenBy }: ColourFieldProps) {
  const id = useId();
  const sharer = takenBy.get(value.toLowerCase());
  const isWritten = /^#[0-9a-f]{6}$/i.test(value);
  return (
    <fieldset>
      <legend className="text-sm font-medium">Colour</legend>
      <div className="mt-1.5 grid grid-cols-5 gap-1.5 max-sm:grid-cols-2">
        {CLASS_PALETTE.map((step) => {
          const taken = takenBy.get(step.colour.toLowerCase());
          return (
            <label
              key={step.colour}
              title={taken ? `${step.name}, used by ${taken}` : step.name}
              className="flex cursor-pointer items-center gap-1.5 rounded-md border border-line px-1.5 py-1.5 text-2xs hover:bg-sunken has-checked:border-ink has-checked:bg-groundsel-wash has-focus-visible:outline-2 has-focus-visible:outline-offset-1 has-focus-visible:outline-ink"
            >
              <input
                type="radio"
                name={`${id}-palette`}
                className="sr-only"
                checked={value.toLowerCase() === step.colour.toLowerCase()}
                onChange={() => onChange(step.colour)}
              />
              <ClassSwatch colour={step.colour} pattern={null} size="sm" />
              <span className={classNames('truncate', taken && 'text-ink-soft')}>{step.name}</span>
              {taken && <span className="sr-only">, used by {taken}</span>}
            </label>
          );
        })}
      </div>
      <div className="mt-2 flex items-center gap-2">
        <label htmlFor={`${id}-any`} className="text-sm whitespace-nowrap text-ink-soft">
          Or any colour
        </label>
        <input
          id={`${id}-any`}
          type="color"
          value={isWritten ? value : '#000000'}
          onChange={(event) => onChange(event.target.value)}
          className="h-9 w-12 rounded-lg border border-edge bg-card p-1"
        />
        <input
          aria-label="Colour as #rrggbb"
          aria-invalid={error ? true : undefined}
          aria-describedby={error ? `${id}-error` : undefined}
          value={value}
          spellCheck={false}
          autoComplete="off"
          onChange={(event) => onChange(event.target.value.trim())}
          className={classNames(INPUT_CLASS, 'w-28!')}
        />
      </div>
      <p role="status" className="text-xs text-ink-soft">
        {sharer && (
          <span className="mt-1.5 block">{sharer} has this colour too; the two are hard to tell apart on a map.</span>
        )}
      </p>
      {error && (
        <p id={`${id}-error`} role="alert" className="mt-1 text-xs font-medium text-rust">
          {error}
        </p>
      )}
    </fieldset>
  );
}
