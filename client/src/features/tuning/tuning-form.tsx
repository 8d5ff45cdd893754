import { useState } from 'react';
import type { Recipe } from '../../../../shared/contracts/run.ts';
import { MAX_TRIALS, type Tuning } from '../../../../shared/contracts/tuning.ts';
import { Callout } from '../../components/ui/callout.tsx';
import { Checkbox } from '../../components/ui/checkbox.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { Field } from '../../components/ui/field.tsx';
import { NumberInput } from '../../components/ui/number-input.tsx';
import { RadioGroup } from '../../components/ui/radio-group.tsx';
import { TextInput } from '../../components/ui/text-input.tsx';
import { formatCount } from '../../lib/format.ts';
import type { useStartTuning } from './tuning-queries.ts';
import { printValue, readValues, TUNABLE } from './tuning-settings.ts';

interface TuningFormProps {
  formId: string;
  recipe: Recipe;
  start: ReturnType<typeof useStartTuning>;
  onStarted: (tuning: Tuning) => void;
}

/** What a search tries, and how it judges. */
export function TuningForm({ formId, recipe, start, onStarted }: TuningFormProps) {
  const settings = TUNABLE[recipe.classifier.kind];
  const [name, setName] = useState('');
  const [texts, setTexts] = useState<Record<string, string>>(() =>
    Object.fromEntries(settings.map(({ parameter, values }) => [parameter, values.map(printValue).join(', ')])),
  );
  const [isOn, setIsOn] = useState<Record<string, boolean>>(() =>
    Object.fromEntries(settings.map((setting) => [setting.parameter, setting.isOn])),
  );
  const [method, setMethod] = useState<'grid' | 'random'>('grid');
  const [nTrials, setNTrials] = useState<number | null>(20);
  const [folds, setFolds] = useState<number | null>(5);
  const [blockMeters, setBlockMeters] = useState<number | null>(1_000);
  const [seed, setSeed] = useState<number | null>(recipe.seed);

  const ranges = settings
    .filter(({ parameter }) => isOn[parameter])
    .map(({ parameter }) => ({ parameter, values: [...new Set(readValues(texts[parameter] ?? ''))] }));
  const nCombinations = ranges.reduce((product, { values }) => product * values.length, ranges.length > 0 ? 1 : 0);
  const nTried = method === 'grid' ? nCombinations : Math.min(nCombinations, nTrials ?? 0);
  const isTooMany = nTried > MAX_TRIALS;
  const submit = () =>
    start.mutate(
      {
        name,
        recipe,
        plan: {
          ...{ method, nTrials: nTrials ?? 20, folds: folds ?? 5, blockMeters: blockMeters ?? 1_000 },
          ...{ seed: seed ?? 1, ranges },
        },
      },
      { onSuccess: onStarted },
    );
  return (
    <form
      id={formId}
      noValidate
      onSubmit={(event) => {
        event.preventDefault();
        submit();
      }}
      className="space-y-8"
    >
      <Field label="Name" isOptional hint="To tell searches apart in lists." className="max-w-md">
        <TextInput autoComplete="off" value={name} maxLength={120} onChange={(event) => setName(event.target.value)} />
      </Field>
      <fieldset>
        <legend className="text-lg font-semibold">What is varied</legend>
        <p className="mb-3 text-sm text-ink-soft">
          Values with commas between them. What is not ticked stays as in the recipe.
        </p>
        <div className="divide-y divide-line rounded-xl border border-line bg-card">
          {settings.map(({ parameter, label, hint }) => (
            <div
              key={parameter}
              className="grid items-start gap-x-6 gap-y-2 px-4 py-3 sm:grid-cols-[14rem_minmax(0,1fr)]"
            >
              <Checkbox
                label={label}
                isChecked={isOn[parameter] ?? false}
                onChange={(next) => setIsOn({ ...isOn, [parameter]: next })}
              />
              <Field label={`Values of ${label}`} isLabelHidden hint={hint}>
                <TextInput
                  autoComplete="off"
                  disabled={!isOn[parameter]}
                  value={texts[parameter] ?? ''}
                  onChange={(event) => setTexts({ ...texts, [parameter]: event.target.value })}
                />
              </Field>
            </div>
          ))}
        </div>
      </fieldset>
      <fieldset>
        <legend className="mb-2 text-lg font-semibold">How many are tried</legend>
        <RadioGroup
          aria-label="How many are tried"
          value={method}
          onChange={setMethod}
          options={[
            { value: 'grid', label: 'All combinations', hint: formatCount(nCombinations, 'combination') },
            { value: 'random', label: 'Some, drawn by the seed', hint: 'For many settings at a time.' },
          ]}
        />
        {method === 'random' && (
          <Field label="Trials" hint={`At most ${MAX_TRIALS}.`} className="mt-3 max-w-40">
            <NumberInput value={nTrials} onChange={setNTrials} />
          </Field>
        )}
        {isTooMany && (
          <Callout tone="beware" title="Too many trials." className="mt-3">
            {nTried} are asked for; at most {MAX_TRIALS} are tried. Give fewer values, or have some drawn.
          </Callout>
        )}
      </fieldset>
      <fieldset>
        <legend className="text-lg font-semibold">How they are judged</legend>
        <p className="mb-3 max-w-2xl text-sm text-ink-soft">
          The training samples are put into folds by blocks of ground. Each trial learns from all folds but one and is
          judged by that one, in turn. Held-out samples take no part, so that they can still judge the run.
        </p>
        <div className="grid max-w-2xl gap-4 sm:grid-cols-3">
          <Field label="Folds" hint="2 to 10.">
            <NumberInput value={folds} onChange={setFolds} />
          </Field>
          <Field label="Side of a block" hint="Wider than neighbours are alike.">
            <NumberInput value={blockMeters} onChange={setBlockMeters} unit="m" />
          </Field>
          <Field label="Seed" hint="Draws blocks and trials.">
            <NumberInput value={seed} onChange={setSeed} />
          </Field>
        </div>
      </fieldset>
      {start.error && <ErrorState error={start.error} isInline />}
    </form>
  );
}
