import { useEffect, useRef, useState } from 'react';
import type { Design, Disagreement } from '../../../../shared/contracts/reference.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { ContextViews } from '../../components/place/context-views.tsx';
import { PointSpectra } from '../../components/place/point-spectra.tsx';
import type { ContextState } from '../../components/place/use-context-views.ts';
import { Button } from '../../components/ui/button.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { chooseClass } from '../../features/interpretation/answer-draft.ts';
import { AlternateSwitch } from '../../features/interpretation/answer-form.tsx';
import { AnswersBeside } from '../../features/interpretation/answers-beside.tsx';
import { classKeys, type NameableClass, takesEnter } from '../../features/interpretation/class-keys.ts';
import { ClassList } from '../../features/interpretation/class-list.tsx';
import {
  type DecisionDraft,
  forgetDecision,
  keepDecision,
  openDecision,
} from '../../features/interpretation/decision-draft.ts';
import { useDecide } from '../../features/interpretation/disagreement-queries.ts';
import { NoteField } from '../../features/interpretation/note-field.tsx';
import { formatCoordinates } from '../../lib/format-coordinates.ts';
import { formatSince } from '../../lib/format-date.ts';
import { useKeys } from '../../lib/keys.ts';
import { useAccount } from '../../lib/use-account.ts';

export interface PointDecisionProps {
  design: Design;
  disagreement: Disagreement;
  classes: readonly NameableClass[];
  scenes: readonly Scene[];
  context: ContextState;
  onDecided: () => void;
}

/** A point at issue: its pictures, what was said of it, and the decision. */
export function PointDecision({ design, disagreement, classes, scenes, context, onDecided }: PointDecisionProps) {
  const { point, answers, decision } = disagreement;
  const { id: personId } = useAccount();
  const [draft, setDraft] = useState(() => openDecision(disagreement, personId));
  const [isAlternate, setIsAlternate] = useState(false);
  const [firstDigit, setFirstDigit] = useState(0);
  const heading = useRef<HTMLHeadingElement>(null);
  const note = useRef<HTMLTextAreaElement>(null);
  const decide = useDecide(design.projectId);
  const canDecide = design.state === 'adjudicating' && design.abilities.adjudicate;
  useEffect(() => {
    // The button pressed last went with its point; the keyboard goes on from the new one.
    if (document.activeElement === document.body) heading.current?.focus({ preventScroll: true });
  }, []);
  const change = (next: DecisionDraft) => {
    if (!canDecide || decide.isPending) return;
    setDraft(next);
    keepDecision(point.id, personId, next);
  };
  const choose = (classId: string) => {
    change(chooseClass(draft, classId, isAlternate));
    setIsAlternate(false);
  };
  const save = () => {
    const { classId, ...rest } = draft;
    if (!canDecide || classId === null || decide.isPending) return;
    const settle = () => {
      forgetDecision(point.id, personId);
      onDecided();
    };
    decide.mutate({ pointId: point.id, decision: { classId, ...rest } }, { onSuccess: settle });
  };
  useKeys({
    ...classKeys(classes, firstDigit, choose, setFirstDigit),
    a: () => setIsAlternate(!isAlternate),
    n: () => note.current?.focus(),
    Enter: (event) => (takesEnter(event) ? false : save()),
  });
  const timesSaid = (classId: string) => {
    const n = answers.filter((one) => one.classId === classId).length;
    if (n > 0) return n === 1 ? 'said by one' : `said by ${n}`;
    return answers.some((one) => one.alternateClassId === classId) ? 'a second choice' : null;
  };
  const [lon, lat] = point.position;
  return (
    <div className="grid min-h-0 grid-cols-[minmax(0,1fr)_22rem] max-md:grid-cols-1 max-md:overflow-y-auto">
      <section aria-label="The place in pictures" className="min-h-0 overflow-y-auto p-3">
        <ContextViews
          projectId={design.projectId}
          place={point}
          views={context.shown}
          zoomSteps={context.zoomSteps}
          hasOutlines={context.hasOutlines}
          isLocal={context.isLocal}
          onEnlarge={context.enlarge}
          isLarge={context.largeId !== null}
        />
      </section>
      <aside
        aria-label={`Point ${point.number}`}
        className="flex min-h-0 flex-col border-l border-line bg-card text-sm max-md:border-t max-md:border-l-0"
      >
        <header className="flex items-baseline gap-2 px-[18px] pt-2.5">
          <h2 ref={heading} tabIndex={-1} className="text-lg font-semibold whitespace-nowrap outline-none">
            Point {point.number}
          </h2>
          <p className="text-xs text-ink-soft">{formatCoordinates(lat, lon)}</p>
        </header>
        <div className="min-h-0 grow space-y-3 overflow-y-auto px-[18px] py-2.5">
          <AnswersBeside answers={answers} classes={classes} />
          <div>
            <div className="mb-1.5 flex items-center justify-between gap-2">
              <p className="font-medium">{isAlternate ? 'What else could it be?' : 'What it is'}</p>
              {canDecide && <AlternateSwitch isAlternate={isAlternate} onAlternate={setIsAlternate} />}
            </div>
            <ClassList
              classes={classes}
              firstDigit={firstDigit}
              classId={draft.classId}
              alternateClassId={draft.alternateClassId}
              isAlternate={isAlternate}
              isDisabled={!canDecide}
              noteOf={timesSaid}
              onChoose={choose}
            />
          </div>
          <NoteField
            ref={note}
            label="Why"
            value={draft.note}
            isDisabled={!canDecide}
            placeholder="What settled it"
            onChange={(text) => change({ ...draft, note: text })}
          />
          {decision && (
            <p className="text-xs text-ink-soft">
              Decided by {decision.decidedBy?.name ?? 'someone no longer here'}, {formatSince(decision.decidedAt)}.
            </p>
          )}
          {decide.error && <ErrorState error={decide.error} isInline onRetry={save} />}
          <PointSpectra
            projectId={design.projectId}
            scenes={scenes.filter(({ state }) => state === 'ready')}
            outline={point.outline}
            outline3={point.outline3}
          />
        </div>
        {canDecide && (
          <footer className="flex border-t border-line px-[18px] py-2.5 *:grow">
            <Button
              kind="primary"
              onClick={save}
              isPending={decide.isPending}
              disabled={draft.classId === null}
              aria-keyshortcuts="Enter"
            >
              {decision ? 'Change the decision' : 'Decide and go on'} ↵
            </Button>
          </footer>
        )}
      </aside>
    </div>
  );
}
