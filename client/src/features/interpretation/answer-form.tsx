import { type Ref } from 'react';
import type { BlindPoint } from '../../../../shared/contracts/reference.ts';
import { confidenceSchema } from '../../../../shared/contracts/sample.ts';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import { Field } from '../../components/ui/field.tsx';
import { Kbd } from '../../components/ui/kbd.tsx';
import { Segmented } from '../../components/ui/segmented.tsx';
import { TextArea } from '../../components/ui/text-input.tsx';
import { classNames } from '../../lib/class-names.ts';
import type { AnswerDraft } from './answer-draft.ts';

export interface AnswerFormProps {
  point: Pick<BlindPoint, 'takesAnswer' | 'refusal'>;
  classes: readonly { id: string; name: string; colour: string; position: number }[];
  draft: AnswerDraft;
  /** The digits set the alternate instead of the class. */
  isAlternate: boolean;
  /** First class the digits stand for: 0, 10, 20 … */
  firstDigit: number;
  noteRef: Ref<HTMLTextAreaElement>;
  onClass: (classId: string, isAlternate: boolean) => void;
  onAlternate: (isAlternate: boolean) => void;
  onChange: (draft: AnswerDraft) => void;
}

const CONFIDENCE_NAMES = { low: 'Unsure', medium: 'Fairly sure', high: 'Sure' } as const;

/** What the point is: class, second choice, confidence, note. */
export function AnswerForm(props: AnswerFormProps) {
  const { point, classes, draft, isAlternate, firstDigit, noteRef, onClass, onAlternate, onChange } = props;
  return (
    <fieldset disabled={!point.takesAnswer} className="space-y-4">
      {point.refusal && <p className="rounded-lg bg-sunken px-3 py-2 text-sm">{point.refusal}</p>}
      <div>
        <div className="mb-1.5 flex items-center justify-between gap-2">
          <p className="text-sm font-medium">{isAlternate ? 'Second choice' : 'What is it?'}</p>
          <button
            type="button"
            aria-pressed={isAlternate}
            aria-keyshortcuts="A"
            onClick={() => onAlternate(!isAlternate)}
            className="link flex items-center gap-1.5 text-sm"
          >
            {isAlternate ? 'Back to the class' : 'Second choice'} <Kbd>A</Kbd>
          </button>
        </div>
        <div role="group" aria-label={isAlternate ? 'Second choice' : 'Class of the point'} className="grid gap-1">
          {classes.map((one, place) => {
            const digit = place >= firstDigit && place < firstDigit + 10 ? String((place - firstDigit + 1) % 10) : null;
            const isFirst = draft.classId === one.id;
            const isSecond = draft.alternateClassId === one.id;
            return (
              <button
                key={one.id}
                type="button"
                aria-pressed={isAlternate ? isSecond : isFirst}
                disabled={isAlternate && isFirst}
                onClick={() => onClass(one.id, isAlternate)}
                className={classNames(
                  'focus-inset flex min-h-8 items-center gap-2.5 rounded-md border px-2 text-left text-sm disabled:cursor-not-allowed',
                  isFirst ? 'border-ink bg-groundsel-wash font-medium' : 'border-line bg-card hover:bg-sunken',
                )}
              >
                <span className="w-4 text-center text-xs text-ink-soft">{digit}</span>
                <ClassSwatch size="sm" colour={one.colour} position={one.position} />
                <span className="min-w-0 grow truncate">{one.name}</span>
                {isFirst && <span className="text-xs">class</span>}
                {isSecond && <span className="text-xs text-ink-soft">second choice</span>}
              </button>
            );
          })}
        </div>
      </div>
      <div>
        <p className="mb-1 flex items-center gap-1.5 text-sm font-medium">
          Confidence <Kbd>C</Kbd>
        </p>
        <Segmented
          label="Confidence"
          value={draft.confidence}
          onChange={(confidence) => onChange({ ...draft, confidence })}
          options={confidenceSchema.options.map((value) => ({ value, label: CONFIDENCE_NAMES[value] }))}
        />
      </div>
      <Field
        label={
          <span className="inline-flex items-center gap-1.5">
            Note <Kbd>N</Kbd>
          </span>
        }
        isOptional
      >
        <TextArea
          ref={noteRef}
          rows={2}
          maxLength={2_000}
          value={draft.note}
          placeholder="What was seen, and what else it could be"
          onChange={(event) => onChange({ ...draft, note: event.target.value })}
          onKeyDown={(event) => {
            if (event.key === 'Escape' || (event.key === 'Enter' && (event.ctrlKey || event.metaKey))) {
              event.preventDefault();
              event.currentTarget.blur();
            }
          }}
        />
      </Field>
    </fieldset>
  );
}
