import type { Band } from '../../../../shared/contracts/scene.ts';
import { classNames } from '../../lib/class-names.ts';

export interface BandTogglesProps {
  bands: readonly Band[];
  /** Numbers of the bands that count. */
  chosen: readonly number[];
  onChange: (bands: number[]) => void;
}

/** Which bands the separability is computed over; one always stays. */
export function BandToggles({ bands, chosen, onChange }: BandTogglesProps) {
  return (
    <div role="group" aria-label="Bands that count" className="flex flex-wrap gap-1.5">
      {bands.map(({ number, name }) => {
        const isOn = chosen.includes(number);
        const isLast = isOn && chosen.length === 1;
        return (
          <button
            key={number}
            type="button"
            aria-pressed={isOn}
            disabled={isLast}
            onClick={() =>
              onChange(
                bands.map((band) => band.number).filter((one) => (one === number ? !isOn : chosen.includes(one))),
              )
            }
            className={classNames(
              'min-h-7 rounded-md border px-2 text-sm',
              isOn ? 'border-ink bg-ink text-paper' : 'border-edge bg-card text-ink-soft',
            )}
          >
            {number} · {name}
          </button>
        );
      })}
    </div>
  );
}
