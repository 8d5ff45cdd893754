import { Plus, X } from 'lucide-react';
import type { PostProcessingStep } from '../../../../shared/contracts/post-processing.ts';
import { Button } from '../../components/ui/button.tsx';
import { Field } from '../../components/ui/field.tsx';
import { IconButton } from '../../components/ui/icon-button.tsx';
import { NumberInput } from '../../components/ui/number-input.tsx';
import { Select } from '../../components/ui/select.tsx';
import { TextInput } from '../../components/ui/text-input.tsx';
import { ClassSelect } from './class-select.tsx';
import type { ClassChoice } from './step-text.ts';

const WINDOWS = [3, 5, 7, 9, 11, 15, 21, 25];

interface StepFieldsProps {
  step: PostProcessingStep;
  classes: readonly ClassChoice[];
  layers: readonly { id: string; name: string }[];
  hasStudyArea: boolean;
  onChange: (step: PostProcessingStep) => void;
}

/** The settings of one step. */
export function StepFields({ step, classes, layers, hasStudyArea, onChange }: StepFieldsProps) {
  switch (step.kind) {
    case 'majority':
      return (
        <div className="grid grid-cols-2 gap-2">
          <Field label="Window">
            <Select
              size="sm"
              value={String(step.windowPixels)}
              onChange={(side) => onChange({ ...step, windowPixels: Number(side) })}
              options={WINDOWS.map((side) => ({ value: String(side), label: `${side} × ${side} pixels` }))}
            />
          </Field>
          <Field label="On a tie">
            <Select
              size="sm"
              value={step.ties}
              onChange={(ties) => onChange({ ...step, ties })}
              options={[
                { value: 'keep-centre', label: 'keep the pixel' },
                { value: 'lowest-code', label: 'lowest class code' },
              ]}
            />
          </Field>
        </div>
      );
    case 'sieve':
      return (
        <div className="grid grid-cols-2 gap-2">
          <Field label="Smallest patch">
            <NumberInput
              unit="ha"
              value={step.minAreaHa}
              onChange={(minAreaHa) => minAreaHa !== null && minAreaHa > 0 && onChange({ ...step, minAreaHa })}
            />
          </Field>
          <Field label="Hang together by">
            <Select
              size="sm"
              value={String(step.neighbours)}
              onChange={(n) => onChange({ ...step, neighbours: n === '8' ? 8 : 4 })}
              options={[
                { value: '4', label: 'sides (4)' },
                { value: '8', label: 'sides, corners (8)' },
              ]}
            />
          </Field>
        </div>
      );
    case 'recode':
      return (
        <div className="space-y-1.5">
          {step.pairs.map((pair, i) => {
            const replace = (next: Partial<typeof pair>) =>
              onChange({ ...step, pairs: step.pairs.map((one, n) => (n === i ? { ...one, ...next } : one)) });
            return (
              <div key={pair.from} className="flex items-center gap-1.5">
                <ClassSelect label="From" classes={classes} value={pair.from} onChange={(from) => replace({ from })} />
                <span aria-hidden>→</span>
                <ClassSelect
                  label="To"
                  classes={classes}
                  value={pair.to}
                  withNodata
                  onChange={(to) => replace({ to })}
                />
                {step.pairs.length > 1 && (
                  <IconButton
                    label="Leave out"
                    size="sm"
                    icon={<X />}
                    onClick={() => onChange({ ...step, pairs: step.pairs.filter((_, n) => n !== i) })}
                  />
                )}
              </div>
            );
          })}
          <Button
            kind="ghost"
            size="sm"
            icon={<Plus />}
            onClick={() => {
              const free = classes.find(({ id }) => !step.pairs.some(({ from }) => from === id));
              const to = step.pairs[0]?.to ?? 'unclassified';
              if (free) onChange({ ...step, pairs: [...step.pairs, { from: free.id, to }] });
            }}
          >
            Another class
          </Button>
        </div>
      );
    case 'fill':
      return (
        <div className="grid grid-cols-2 gap-2">
          <Field label="Where">
            <Select
              size="sm"
              value={step.where}
              onChange={(where) => onChange({ ...step, where })}
              options={[
                { value: 'inside', label: 'inside' },
                { value: 'outside', label: 'outside' },
              ]}
            />
          </Field>
          <Field label="Mask">
            <Select
              size="sm"
              value={step.mask.kind === 'zones' ? step.mask.layerId : 'study-area'}
              onChange={(value) =>
                onChange({
                  ...step,
                  mask: value === 'study-area' ? { kind: 'study-area' } : { kind: 'zones', layerId: value },
                })
              }
              options={[
                ...(hasStudyArea ? [{ value: 'study-area', label: 'study area' }] : []),
                ...layers.map(({ id, name }) => ({ value: id, label: name })),
              ]}
            />
          </Field>
          <Field label="Becomes" className="col-span-2">
            <ClassSelect classes={classes} value={step.to} withNodata onChange={(to) => onChange({ ...step, to })} />
          </Field>
        </div>
      );
    case 'reclass':
      return (
        <div className="space-y-2">
          <div className="flex items-center gap-1.5">
            <ClassSelect
              label="From"
              classes={classes}
              value={step.from}
              withAny
              onChange={(from) => onChange({ ...step, from })}
            />
            <span aria-hidden>→</span>
            <ClassSelect
              label="To"
              classes={classes}
              value={step.to}
              withNodata
              onChange={(to) => onChange({ ...step, to })}
            />
          </div>
          <Field
            label="Reason"
            error={step.reason.trim().length < 3 ? 'Say why, so that a reader can judge it.' : undefined}
          >
            <TextInput value={step.reason} onChange={(event) => onChange({ ...step, reason: event.target.value })} />
          </Field>
          {step.by && <p className="text-xs text-ink-soft">{step.by}</p>}
        </div>
      );
  }
}
