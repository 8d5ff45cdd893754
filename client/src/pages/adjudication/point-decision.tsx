import { useRef, useState } from 'react';
import type { Design, Disagreement } from '../../../../shared/contracts/reference.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { Button } from '../../components/ui/button.tsx';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { Field } from '../../components/ui/field.tsx';
import { Kbd } from '../../components/ui/kbd.tsx';
import { TextArea } from '../../components/ui/text-input.tsx';
import { AnswersBeside } from '../../features/interpretation/answers-beside.tsx';
import { ContextViews } from '../../components/place/context-views.tsx';
import { useDecide } from '../../features/interpretation/disagreement-queries.ts';
import { PointSpectra } from '../../components/place/point-spectra.tsx';
import type { useContextViews } from '../../components/place/use-context-views.ts';
import { classNames } from '../../lib/class-names.ts';
import { formatCoordinates } from '../../lib/format-coordinates.ts';
import { formatSince } from '../../lib/format-date.ts';
import { type KeyMap, useKeys } from '../../lib/keys.ts';

export interface PointDecisionProps {
  design: Design;
  disagreement: Disagreement;
  classes: readonly { id: string; name: string; colour: string; position: number }[];
  scenes: readonly Scene[];
  context: ReturnType<typeof useContextViews>;
  onDecided: () => void;
}

/** A point at issue: its pictures, what was said of it, and the decision. */
export function PointDecision({ design, disagreement, classes, scenes, context, onDecided }: PointDecisionProps) {
  const { point, answers, decision } = disagreement;
  const [classId, setClassId] = useState(decision?.classId ?? null);
  const [noteText, setNoteText] = useState(decision?.note ?? '');
  const note = useRef<HTMLTextAreaElement>(null);
  const decide = useDecide(design.projectId);
  const canDecide = design.state === 'adjudicating' && design.abilities.adjudicate;
  // Those that somebody said come first; any other class may be right as well.
  const said = new Set(answers.flatMap((one) => [one.classId, one.alternateClassId]));
  const ordered = [...classes.filter(({ id }) => said.has(id)), ...classes.filter(({ id }) => !said.has(id))];
  const save = () => {
    if (!canDecide || classId === null || decide.isPending) return;
    decide.mutate({ pointId: point.id, decision: { classId, note: noteText } }, { onSuccess: onDecided });
  };
  const keys: KeyMap = {};
  ordered.slice(0, 10).forEach(({ id }, place) => {
    keys[String((place + 1) % 10)] = () => canDecide && setClassId(id);
  });
  useKeys({
    ...keys,
    n: () => note.current?.focus(),
    Enter: ({ target }) =>
      target instanceof HTMLElement && target.closest('button:not([aria-pressed=true]), a') ? false : save(),
  });
  const [lon, lat] = point.position;
  return (
    <div className="grid min-h-0 grid-cols-[minmax(0,1fr)_22rem] max-md:grid-cols-1 max-md:overflow-y-auto">
      <section aria-label="The place in pictures" className="min-h-0 overflow-y-auto p-3">
        <ContextViews place={point} views={context.shown} zoomSteps={context.zoomSteps} />
      </section>
      <aside
        aria-label={`Point ${point.number}`}
        className="flex min-h-0 flex-col border-l border-line bg-card text-sm max-md:border-t max-md:border-l-0"
      >
        <header className="px-[18px] pt-3">
          <h2 className="text-lg font-semibold">Point {point.number}</h2>
          <p className="text-xs text-ink-soft">{formatCoordinates(lat, lon)}</p>
        </header>
        <div className="min-h-0 grow space-y-4 overflow-y-auto px-[18px] py-3">
          <AnswersBeside answers={answers} classes={classes} />
          <PointSpectra
            projectId={design.projectId}
            scenes={scenes.filter(({ state }) => state === 'ready')}
            outline={point.outline}
            outline3={point.outline3}
          />
          <div role="group" aria-label="Decision" className="grid gap-1">
            {ordered.map((one, place) => (
              <button
                key={one.id}
                type="button"
                disabled={!canDecide}
                aria-pressed={classId === one.id}
                onClick={() => setClassId(one.id)}
                className={classNames(
                  'focus-inset flex min-h-8 items-center gap-2.5 rounded-md border px-2 text-left disabled:cursor-not-allowed',
                  classId === one.id
                    ? 'border-ink bg-groundsel-wash font-medium'
                    : 'border-line bg-card hover:bg-sunken',
                )}
              >
                <span className="w-4 text-center text-xs text-ink-soft">
                  {place < 10 ? String((place + 1) % 10) : ''}
                </span>
                <ClassSwatch size="sm" colour={one.colour} position={one.position} />
                <span className="grow">{one.name}</span>
                {said.has(one.id) && <span className="text-xs text-ink-soft">said</span>}
              </button>
            ))}
          </div>
          <Field
            label={
              <span className="inline-flex items-center gap-1.5">
                Why <Kbd>N</Kbd>
              </span>
            }
            isOptional
          >
            <TextArea
              ref={note}
              rows={2}
              maxLength={2_000}
              value={noteText}
              disabled={!canDecide}
              onChange={(event) => setNoteText(event.target.value)}
              onKeyDown={(event) => {
                if (event.key === 'Escape' || (event.key === 'Enter' && (event.ctrlKey || event.metaKey))) {
                  event.preventDefault();
                  event.currentTarget.blur();
                }
              }}
            />
          </Field>
          {decision && (
            <p className="text-xs text-ink-soft">
              Decided by {decision.decidedBy?.name ?? 'someone no longer here'}, {formatSince(decision.decidedAt)}.
            </p>
          )}
          {decide.error && <ErrorState error={decide.error} isInline onRetry={save} />}
        </div>
        {canDecide && (
          <footer className="flex border-t border-line px-[18px] py-3 *:grow">
            <Button
              kind="primary"
              onClick={save}
              isPending={decide.isPending}
              disabled={classId === null}
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
