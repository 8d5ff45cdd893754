import type { ReactNode } from 'react';
import type { Run } from '../../../../shared/contracts/run.ts';
import { Field } from '../../components/ui/field.tsx';
import { NumberInput } from '../../components/ui/number-input.tsx';
import { RadioGroup } from '../../components/ui/radio-group.tsx';
import { Segmented } from '../../components/ui/segmented.tsx';
import { Select } from '../../components/ui/select.tsx';
import { TextInput } from '../../components/ui/text-input.tsx';
import { ExpectedFields } from './expected-fields.tsx';
import type { PlanValues } from './plan-values.ts';
import { StrataFields } from './strata-fields.tsx';

export interface PlanFormProps {
  values: PlanValues;
  onChange: (values: PlanValues) => void;
  /** Finished ones, newest first. */
  runs: readonly Run[];
  positions: ReadonlyMap<string, number>;
}

/** What a design is wanted for: the map, the precision, the shares of the strata, and how its points are looked at. */
export function PlanForm({ values, onChange, runs, positions }: PlanFormProps) {
  const set = (change: Partial<PlanValues>) => onChange({ ...values, ...change });
  const run = runs.find(({ id }) => id === values.runId);
  return (
    <div className="space-y-7">
      <Part title="Map">
        <div className="grid gap-4 sm:grid-cols-2">
          <Field label="Run">
            <Select
              value={values.runId}
              onChange={(runId) => set({ runId, expectedPercent: {}, fromRunId: null })}
              options={runs.map((one) => ({
                value: one.id,
                label: `Run ${one.number}${one.name ? `, ${one.name}` : ''}`,
              }))}
            />
          </Field>
          <Field label="Name" isOptional>
            <TextInput value={values.name} maxLength={120} onChange={(event) => set({ name: event.target.value })} />
          </Field>
        </div>
      </Part>
      <Part title="Strata" note="What the points are drawn from, each at random.">
        <StrataFields values={values} onChange={set} runs={runs} />
      </Part>
      <Part title="Precision" note="Of overall accuracy. The curve at the side shows what more points would bring.">
        <Segmented<PlanValues['target']>
          label="What is wanted"
          value={values.target}
          onChange={(target) => set({ target })}
          options={[
            { value: 'half-width', label: '95 % interval' },
            { value: 'standard-error', label: 'Standard error' },
            { value: 'total', label: 'Number of points' },
          ]}
        />
        <div className="max-w-56">
          {values.target === 'half-width' && (
            <Field label="Half-width of the interval">
              <NumberInput
                unit="± %"
                value={values.halfWidthPercent}
                onChange={(halfWidthPercent) => set({ halfWidthPercent })}
              />
            </Field>
          )}
          {values.target === 'standard-error' && (
            <Field label="Standard error">
              <NumberInput
                unit="%"
                value={values.standardErrorPercent}
                onChange={(standardErrorPercent) => set({ standardErrorPercent })}
              />
            </Field>
          )}
          {values.target === 'total' && (
            <Field label="Points in all">
              <NumberInput value={values.total} onChange={(total) => set({ total })} />
            </Field>
          )}
        </div>
      </Part>
      <Part
        title={values.strata === 'map-classes' ? 'Expected user’s accuracy' : 'Expected accuracy'}
        note="A guess from held-out samples will do: it decides how many points are drawn, not what they find."
      >
        <ExpectedFields
          classes={values.strata === 'map-classes' ? (run?.classes ?? []) : []}
          positions={positions}
          expectedPercent={values.expectedPercent}
          otherwisePercent={values.otherwisePercent}
          onExpected={(expectedPercent) => set({ expectedPercent })}
          onOtherwise={(otherwisePercent) => set({ otherwisePercent })}
        />
      </Part>
      <Part title="Allocation" note="How the points are shared out among the strata.">
        <RadioGroup<PlanValues['allocation']>
          aria-label="Allocation"
          value={values.allocation}
          onChange={(allocation) => set({ allocation })}
          options={[
            {
              value: 'minimum',
              label: 'A minimum for each class, the rest by area',
              hint: 'Keeps rare classes readable without costing the areas much.',
            },
            {
              value: 'proportional',
              label: 'By area',
              hint: 'Best for overall accuracy; rare classes get few points.',
            },
            {
              value: 'neyman',
              label: 'By area and expected error',
              hint: 'Neyman: fewest points for overall accuracy, if the guess above is right.',
            },
            { value: 'equal', label: 'The same for each class', hint: 'Best for user’s accuracy; costs the areas.' },
          ]}
        />
        {values.allocation === 'minimum' && (
          <Field label="At least, a class" className="max-w-56">
            <NumberInput value={values.atLeast} onChange={(atLeast) => set({ atLeast })} />
          </Field>
        )}
      </Part>
      <Part title="Interpretation">
        <div className="grid gap-4 sm:grid-cols-3">
          <Field label="People a point" hint="Two or more show how far they agree.">
            <NumberInput value={values.answersPerPoint} onChange={(answersPerPoint) => set({ answersPerPoint })} />
          </Field>
          <Field label="Least distance" hint="0 for none. Any other biases the estimates a little.">
            <NumberInput
              unit="m"
              value={values.minSpacingMeters}
              onChange={(minSpacingMeters) => set({ minSpacingMeters })}
            />
          </Field>
          <Field label="Seed" isOptional hint="The same seed draws the same points.">
            <NumberInput value={values.seed} onChange={(seed) => set({ seed })} placeholder="at random" />
          </Field>
        </div>
      </Part>
    </div>
  );
}

function Part({ title, note, children }: { title: string; note?: string; children: ReactNode }) {
  return (
    <section className="border-t border-line pt-5 first:border-0 first:pt-0">
      <h2 className="text-lg font-semibold">{title}</h2>
      {note && <p className="mb-3 text-sm text-ink-soft">{note}</p>}
      <div className="space-y-4">{children}</div>
    </section>
  );
}
