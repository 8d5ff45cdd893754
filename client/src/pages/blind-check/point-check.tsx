import { ArrowLeft, ArrowRight } from 'lucide-react';
import { useRef, useState } from 'react';
import type { BlindPoint, Design } from '../../../../shared/contracts/reference.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
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
import { ContextViews } from '../../components/place/context-views.tsx';
import { PointSpectra } from '../../components/place/point-spectra.tsx';
import type { useContextViews } from '../../components/place/use-context-views.ts';
import { formatCoordinates } from '../../lib/format-coordinates.ts';
import { type KeyMap, useKeys } from '../../lib/keys.ts';

export interface PointCheckProps {
  design: Design;
  point: BlindPoint;
  classes: readonly { id: string; name: string; colour: string; position: number }[];
  scenes: readonly Scene[];
  context: ReturnType<typeof useContextViews>;
  onGo: (number: number) => void;
  /** To the next point that waits. */
  onNext: () => void;
}

const MS = 1000;
/** Longer than this is a break, not a look. */
const LONGEST_LOOK_SECONDS = 900;

/** A button or link with the focus takes Enter itself, but for the class already chosen, where it can only mean "save". */
function wantsEnter({ target }: KeyboardEvent): boolean {
  if (!(target instanceof HTMLElement)) return false;
  const control = target.closest('button, a');
  return control !== null && control.getAttribute('aria-pressed') !== 'true';
}

/** One point: its pictures and spectra at the left, the answer at the right. */
export function PointCheck({ design, point, classes, scenes, context, onGo, onNext }: PointCheckProps) {
  const [draft, setDraft] = useState(() => openDraft(point));
  const [isAlternate, setIsAlternate] = useState(false);
  const [firstDigit, setFirstDigit] = useState(0);
  const [beganAt] = useState(() => Date.now());
  const note = useRef<HTMLTextAreaElement>(null);
  const put = usePutAnswer(design.projectId, design.id);
  const skip = useSkipPoint(design.id);
  const change = (next: AnswerDraft) => {
    setDraft(next);
    keepDraft(point.id, next);
  };
  const choose = (classId: string, asAlternate: boolean) => {
    if (!point.takesAnswer) return;
    change(chooseClass(draft, classId, asAlternate));
    setIsAlternate(false);
  };
  const save = () => {
    if (!point.takesAnswer || draft.classId === null || put.isPending) return;
    const seconds = Math.min(LONGEST_LOOK_SECONDS, (Date.now() - beganAt) / MS);
    put.mutate(
      { point, answer: { ...draft, classId: draft.classId, seconds } },
      {
        onSuccess: () => {
          forgetDraft(point.id);
          onNext();
        },
      },
    );
  };
  const skipIt = () => {
    if (!skip.isPending && point.takesAnswer) skip.mutate(point, { onSuccess: onNext });
  };
  const classKeys: KeyMap = {};
  classes.slice(firstDigit, firstDigit + 10).forEach(({ id }, place) => {
    classKeys[String((place + 1) % 10)] = () => choose(id, isAlternate);
  });
  useKeys({
    ...classKeys,
    PageDown: () => setFirstDigit((first) => (first + 10 < classes.length ? first + 10 : first)),
    PageUp: () => setFirstDigit((first) => Math.max(0, first - 10)),
    a: () => setIsAlternate(!isAlternate),
    c: () => point.takesAnswer && change({ ...draft, confidence: nextConfidence(draft.confidence) }),
    n: () => note.current?.focus(),
    s: skipIt,
    Enter: (event) => (wantsEnter(event) ? false : save()),
    ArrowLeft: () => point.previousNumber !== null && onGo(point.previousNumber),
    ArrowRight: () => point.nextNumber !== null && onGo(point.nextNumber),
  });
  const [lon, lat] = point.position;
  return (
    <div className="grid min-h-0 grow grid-cols-[minmax(0,1fr)_22rem] max-md:grid-cols-1 max-md:overflow-y-auto">
      <section aria-label="The place in pictures" className="flex min-h-0 flex-col gap-2 p-3 max-md:min-h-[60dvh]">
        <div className="min-h-0 grow overflow-y-auto">
          <ContextViews place={point} views={context.shown} zoomSteps={context.zoomSteps} />
        </div>
      </section>
      <aside
        aria-label={`Point ${point.number}`}
        className="flex min-h-0 flex-col border-l border-line bg-card text-sm max-md:border-t max-md:border-l-0"
      >
        <header className="flex items-center gap-2 px-[18px] pt-3">
          <div className="min-w-0 grow">
            <h2 className="text-lg font-semibold">Point {point.number}</h2>
            <p className="text-xs text-ink-soft">
              {formatCoordinates(lat, lon)} · place {point.place} in your order
            </p>
          </div>
          <IconButton
            label="The point before"
            shortcut="←"
            size="sm"
            icon={<ArrowLeft />}
            disabled={point.previousNumber === null}
            onClick={() => point.previousNumber !== null && onGo(point.previousNumber)}
          />
          <IconButton
            label="The point after"
            shortcut="→"
            size="sm"
            icon={<ArrowRight />}
            disabled={point.nextNumber === null}
            onClick={() => point.nextNumber !== null && onGo(point.nextNumber)}
          />
        </header>
        <div className="min-h-0 grow space-y-4 overflow-y-auto px-[18px] py-3">
          <PointSpectra
            projectId={design.projectId}
            scenes={scenes.filter(({ state }) => state === 'ready')}
            outline={point.outline}
            outline3={point.outline3}
          />
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
          {put.isPaused && (
            <Callout tone="beware">The line is down. Your answer is kept here and sent once it is back.</Callout>
          )}
          {(put.error ?? skip.error) && <ErrorState error={put.error ?? skip.error} isInline onRetry={save} />}
        </div>
        <footer className="flex gap-2 border-t border-line px-[18px] py-3 *:grow">
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
