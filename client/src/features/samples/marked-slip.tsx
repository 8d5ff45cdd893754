import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import type { Sample } from '../../../../shared/contracts/sample.ts';
import { Slip } from '../../components/layout/slip.tsx';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import { formatCount } from '../../lib/format.ts';

export interface MarkedSlipProps {
  samples: readonly Sample[];
  /** How many were asked for; the rest were deleted since. */
  nWanted: number;
  classes: ReadonlyMap<string, LandClass>;
  onSelect: (sample: Sample) => void;
  onClose: () => void;
}

/** Several samples marked by a link (a cell of a confusion matrix): one press opens each. */
export function MarkedSlip({ samples, nWanted, classes, onSelect, onClose }: MarkedSlipProps) {
  const nGone = nWanted - samples.length;
  return (
    <Slip
      title={`${formatCount(samples.length, 'sample')} marked`}
      note="Gold on the map. Press one to open it."
      onClose={onClose}
    >
      <ul className="-mx-2">
        {samples.map((sample) => {
          const landClass = classes.get(sample.classId);
          return (
            <li key={sample.id}>
              <button
                type="button"
                onClick={() => onSelect(sample)}
                className="flex w-full items-center gap-2 rounded-md px-2 py-1.5 text-left hover:bg-sunken"
              >
                {landClass && <ClassSwatch colour={landClass.colour} position={landClass.position} />}
                <span className="font-medium">{landClass?.name ?? 'Class taken away'}</span>
                <span className="text-ink-soft">sample {sample.number}</span>
                <span className="ml-auto text-ink-soft">{formatCount(sample.pixelCount, 'pixel')}</span>
              </button>
            </li>
          );
        })}
      </ul>
      {nGone > 0 && (
        <p className="text-ink-soft">
          {formatCount(nGone, 'sample')} of the link {nGone === 1 ? 'was' : 'were'} deleted since.
        </p>
      )}
    </Slip>
  );
}
