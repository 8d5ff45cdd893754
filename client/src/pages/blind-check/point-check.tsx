import { ArrowLeft, ArrowRight } from 'lucide-react';
import { useEffect, useRef, useState } from 'react';
import type { BlindPoint, Design } from '../../../../shared/contracts/reference.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { ContextViews } from '../../components/place/context-views.tsx';
import { PointSpectra } from '../../components/place/point-spectra.tsx';
import type { ContextState } from '../../components/place/use-context-views.ts';
import { Button } from '../../components/ui/button.tsx';
import { Callout } from '../../components/ui/callout.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { IconButton } from '../../components/ui/icon-button.tsx';
import { Kbd } from '../../components/ui/kbd.tsx';
import {
  type AnswerDraft,
  chooseClass,
  forgetDraft,
  keepDraft,
  nextConfidence,
  openDraft,
} from '../../features/interpretation/answer-draft.ts';
import { AnswerForm } from '../../features/interpretation/answer-form.tsx';
import { usePutAnswer, useSkipPoint } from '../../features/interpretation/blind-point-queries.ts';
import { classKeys, type NameableClass, releaseFocus, takesEnter } from '../../features/interpretation/class-keys.ts';
import { formatCoordinates } from '../../lib/format-coordinates.ts';
import { useKeys } from '../../lib/keys.ts';
import { asProblem } from '../../lib/problem-error.ts';
import { useAccount } from '../../lib/use-account.ts';
import { FollowingPlace } from './following-place.tsx';

export interface PointCheckProps {
  design: Design;
  point: BlindPoint;
  classes: readonly NameableClass[];
  scenes: readonly Scene[];
  context: ContextState;
  /** Another point is on its way: what is pressed now is not meant for this one. */
  isLeaving: boolean;
  onGo: (number: number) => void;
  /** To the next point that waits. */
  onNext: () => void;
}

const MS = 1000;
/** Longer than this is a break, not a look. */
const LONGEST_LOOK_SECONDS = 900;

/** One point: its pictures at the left, the answer and the spectra at the right. */
export function PointCheck(props: PointCheckProps) {
  const { design, point, classes, scenes, context, isLeaving, onGo, onNext } = props;
  const { id: personId } = useAccount();
  const [draft, setDraft] = useState(() => openDraft(point, personId));
  const [isAlternate, setIsAlternate] = useState(false);
  const [firstDigit, setFirstDigit] = useState(0);
  const [beganAt] = useState(() => Date.now());
  const heading = useRef<HTMLHeadingElement>(null);
  const note = useRef<HTMLTextAreaElement>(null);
  const put = usePutAnswer(design.projectId, design.id);
  const skip = useSkipPoint(design.id);
  const isHeld = !point.takesAnswer || isLeaving || put.isPending || skip.isPending;
  useEffect(() => {
    // The button pressed last went with its point; the keyboard goes on from the new one.
    if (document.activeElement === document.body) heading.current?.focus({ preventScroll: true });
  }, []);
  const change = (next: AnswerDraft) => {
    if (isHeld) return;
    setDraft(next);
    keepDraft(point.id, personId, next);
  };
  const choose = (classId: string) => {
    change(chooseClass(draft, classId, isAlternate));
    setIsAlternate(false);
  };
  const turnConfidence = () => {
    releaseFocus();
    change({ ...draft, confidence: nextConfidence(draft.confidence) });
  };
  const save = () => {
    if (isHeld || draft.classId === null) return;
    const seconds = Math.min(LONGEST_LOOK_SECONDS, (Date.now() - beganAt) / MS);
    const settle = () => {
      forgetDraft(point.id, personId);
      onNext();
    };
    put.mutate({ point, answer: { ...draft, classId: draft.classId, seconds } }, { onSuccess: settle });
  };
  const skipIt = () => {
    if (!isHeld) skip.mutate(point, { onSuccess: onNext });
  };
  const go = (number: number | null) => {
    if (number !== null && !isLeaving && !put.isPending) onGo(number);
  };
  useKeys({
    ...classKeys(classes, firstDigit, choose, setFirstDigit),
    a: () => setIsAlternate(!isAlternate),
    c: turnConfidence,
    n: () => note.current?.focus(),
    s: skipIt,
    Enter: (event) => (takesEnter(event) ? false : save()),
    ArrowLeft: () => go(point.previousNumber),
    ArrowRight: () => go(point.nextNumber),
  });
  const [lon, lat] = point.position;
  const isOnlyOneLeft = skip.isSuccess && !isLeaving;
  return (
    <div className="grid min-h-0 grow grid-cols-[minmax(0,1fr)_22rem] max-md:grid-cols-1 max-md:overflow-y-auto">
      <section aria-label="The place in pictures" className="relative min-h-0 overflow-y-auto p-3 max-md:min-h-[60dvh]">
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
        <FollowingPlace design={design} number={point.nextNumber} scenes={scenes} context={context} />
      </section>
      <aside
        aria-label={`Point ${point.number}`}
        className="flex min-h-0 flex-col border-l border-line bg-card text-sm max-md:border-t max-md:border-l-0"
      >
        <header className="flex items-center gap-1 px-[18px] pt-2.5">
          <h2 ref={heading} tabIndex={-1} className="text-lg font-semibold whitespace-nowrap outline-none">
            Point {point.number}
          </h2>
          <p className="ml-2 min-w-0 grow text-xs text-ink-soft">{formatCoordinates(lat, lon)}</p>
          <IconButton
            label="The point before"
            shortcut="←"
            size="sm"
            icon={<ArrowLeft aria-hidden />}
            disabled={point.previousNumber === null}
            onClick={() => go(point.previousNumber)}
          />
          <IconButton
            label="The point after"
            shortcut="→"
            size="sm"
            icon={<ArrowRight aria-hidden />}
            disabled={point.nextNumber === null}
            onClick={() => go(point.nextNumber)}
          />
        </header>
        <div className="min-h-0 grow space-y-3 overflow-y-auto px-[18px] py-2.5">
          <AnswerForm
            point={point}
            classes={classes}
            draft={draft}
            isAlternate={isAlternate}
            firstDigit={firstDigit}
            noteRef={note}
            onClass={choose}
            onAlternate={setIsAlternate}
            onChange={change}
          />
          <PointSpectra
            projectId={design.projectId}
            scenes={scenes.filter(({ state }) => state === 'ready')}
            outline={point.outline}
            outline3={point.outline3}
          />
        </div>
        <div role="status" className="space-y-2 px-[18px] *:mb-2.5">
          {put.isPaused && (
            <Callout tone="beware" title="No network.">
              Your answer is kept in this browser and sent once the line is back.
            </Callout>
          )}
          {put.isPending && !put.isPaused && put.failureReason && (
            <Callout tone="beware" title="Not saved yet.">
              {asProblem(put.failureReason).title}. It is tried again by itself; your answer is kept in this browser.
            </Callout>
          )}
          {isOnlyOneLeft && <Callout>Skipped. It is the only point that is left.</Callout>}
          {put.error && <ErrorState error={put.error} isInline onRetry={save} />}
          {skip.error && <ErrorState error={skip.error} isInline onRetry={skipIt} />}
        </div>
        <footer className="flex gap-2 border-t border-line px-[18px] py-2.5 *:grow">
          <Button onClick={skipIt} isPending={skip.isPending} disabled={!point.takesAnswer} aria-keyshortcuts="S">
            Skip <Kbd>S</Kbd>
          </Button>
          <Button
            kind="primary"
            onClick={save}
            isPending={put.isPending}
            pendingLabel="Saving…"
            disabled={draft.classId === null || !point.takesAnswer}
            aria-keyshortcuts="Enter"
          >
            Save and go on ↵
          </Button>
        </footer>
      </aside>
    </div>
  );
}
