import type { Run } from '../../../../shared/contracts/run.ts';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import { Field } from '../../components/ui/field.tsx';
import { NumberInput } from '../../components/ui/number-input.tsx';

export interface ExpectedFieldsProps {
  classes: Run['classes'];
  positions: ReadonlyMap<string, number>;
  expectedPercent: Readonly<Record<string, number | null>>;
  /** For classes without a figure of their own. */
  otherwisePercent: number | null;
  onExpected: (expectedPercent: Record<string, number | null>) => void;
  onOtherwise: (otherwisePercent: number | null) => void;
}

/** The user's accuracy expected of each class; an empty field takes the one for all. */
export function ExpectedFields(props: ExpectedFieldsProps) {
  const { classes, positions, expectedPercent, otherwisePercent, onExpected, onOtherwise } = props;
  return (
    <div className="space-y-3">
      <Field label={classes.length > 0 ? 'For all classes' : 'In each stratum'} className="max-w-56">
        <NumberInput unit="%" value={otherwisePercent} onChange={onOtherwise} />
      </Field>
      {classes.length > 0 && (
        <details>
          <summary className="cursor-pointer text-sm font-medium">Class by class</summary>
          <div className="mt-2 grid gap-x-6 gap-y-2 sm:grid-cols-2">
            {classes.map((one) => (
              <div key={one.id} className="flex items-center gap-2">
                <ClassSwatch size="sm" colour={one.colour} position={positions.get(one.id) ?? 0} />
                <span className="min-w-0 grow truncate text-sm">{one.name}</span>
                <span className="w-24 shrink-0">
                  <NumberInput
                    unit="%"
                    aria-label={`Expected user’s accuracy of ${one.name}`}
                    placeholder={otherwisePercent === null ? '' : String(otherwisePercent)}
                    value={expectedPercent[one.id] ?? null}
                    onChange={(percent) => onExpected({ ...expectedPercent, [one.id]: percent })}
                  />
                </span>
              </div>
            ))}
          </div>
        </details>
      )}
    </div>
  );
}
