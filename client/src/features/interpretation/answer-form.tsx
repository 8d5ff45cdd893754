import { type Ref } from 'react';
import type { BlindPoint } from '../../../../shared/contracts/reference.ts';
import { confidenceSchema } from '../../../../shared/contracts/sample.ts';
import { Kbd } from '../../components/ui/kbd.tsx';
import { Segmented } from '../../components/ui/segmented.tsx';
import type { AnswerDraft } from './answer-draft.ts';
import type { NameableClass } from './class-keys.ts';
import { ClassList } from './class-list.tsx';
import { NoteField } from './note-field.tsx';

export interface AnswerFormProps {
  point: Pick<BlindPoint, 'takesAnswer' | 'refusal'>;
  classes: readonly NameableClass[];
  draft: AnswerDraft;
  /** The digits set the second choice instead of the class. */
  isAlternate: boolean;
  /** First class the digits stand for: 0, 10, 20 … */
  firstDigit: number;
  noteRef: Ref<HTMLTextAreaElement>;
  onClass: (classId: string) => void;
  onAlternate: (isAlternate: boolean) => void;
  onChange: (draft: AnswerDraft) => void;
}

export const CONFIDENCE_NAMES = { low: 'Unsure', medium: 'Fairly sure', high: 'Sure' } as const;

/** What the point is: class, second choice, confidence, note. */
export function AnswerForm(props: AnswerFormProps) {
  const { point, classes, draft, isAlternate, firstDigit, noteRef, onClass, onAlternate, onChange } = props;
  return (
    <fieldset disabled={!point.takesAnswer} className="space-y-3">
      {point.refusal && <p className="rounded-lg bg-sunken px-3 py-2 text-sm">{point.refusal}</p>}
      <div>
        <div className="mb-1.5 flex items-center justify-between gap-2">
          <p className="font-medium">{isAlternate ? 'What else could it be?' : 'What is it?'}</p>
          <AlternateSwitch isAlternate={isAlternate} onAlternate={onAlternate} />
        </div>
        <ClassList
          classes={classes}
          firstDigit={firstDigit}
          classId={draft.classId}
          alternateClassId={draft.alternateClassId}
          isAlternate={isAlternate}
          onChoose={onClass}
        />
      </div>
      <div className="flex flex-wrap items-center justify-between gap-x-3 gap-y-1">
        <p className="flex items-center gap-1.5 font-medium">
          Confidence <Kbd>C</Kbd>
        </p>
        <Segmented
          label="Confidence"
          value={draft.confidence}
          onChange={(confidence) => onChange({ ...draft, confidence })}
          options={confidenceSchema.options.map((value) => ({ value, label: CONFIDENCE_NAMES[value] }))}
          className="text-xs!"
        />
      </div>
      <NoteField
        ref={noteRef}
        label="Note"
        value={draft.note}
        placeholder="What was seen, and what else it could be"
        onChange={(note) => onChange({ ...draft, note })}
      />
    </fieldset>
  );
}

/** Whether the digits name the class or the second choice. */
export function AlternateSwitch({
  isAlternate,
  onAlternate,
}: {
  isAlternate: boolean;
  onAlternate: (isAlternate: boolean) => void;
}) {
  return (
    <button
      type="button"
      aria-pressed={isAlternate}
      aria-keyshortcuts="A"
      onClick={() => onAlternate(!isAlternate)}
      className="link flex items-center gap-1.5 text-sm"
    >
      {isAlternate ? 'Back to the class' : 'Second choice'} <Kbd>A</Kbd>
    </button>
  );
}
