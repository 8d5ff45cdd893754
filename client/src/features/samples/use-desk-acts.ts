import { useQueryClient } from '@tanstack/react-query';
import { useEffect, useRef, useState } from 'react';
import { type Sample, sampleSchema } from '../../../../shared/contracts/sample.ts';
import { sayDone, sayProblem } from '../../components/ui/toaster.tsx';
import { ProblemError } from '../../lib/problem-error.ts';
import { createSample } from './create-sample.ts';
import { deleteSample } from './delete-sample.ts';
import {
  type DeskHistory,
  type DeskStep,
  EMPTY_HISTORY,
  closeDrawing,
  describeStep,
  forgetSample,
  forgetStep,
  isWithinReach,
  pushStep,
  stepBack,
  stepForward,
} from './desk-history.ts';
import { type Draft, changedFields, draftToCreate, fieldsToUpdate, isUnchanged, sampleFields } from './draft.ts';
import { restoreSample } from './restore-sample.ts';
import { dropSample, placeSample, refreshSamples } from './samples-query.ts';
import { updateSample } from './update-sample.ts';

/** Someone else saved first: the sample as it stands, or null when they deleted it. */
export interface SampleConflict {
  draft: Draft;
  current: Sample | null;
}

export interface DeskActsOptions {
  projectId: string;
  draft: Draft | null;
  setDraft: (draft: Draft | null) => void;
  onSelect: (sampleId: string | null) => void;
}

/** Notes of the desk take each other's place. */
const LINE = 'desk';

/** Saving, deleting and restoring samples, with one line of steps that undo and redo walk along. */
export function useDeskActs({ projectId, draft, setDraft, onSelect }: DeskActsOptions) {
  const queryClient = useQueryClient();
  const [history, setHistory] = useState<DeskHistory>(EMPTY_HISTORY);
  const [isBusy, setIsBusy] = useState(false);
  const [saveError, setSaveError] = useState<ProblemError | null>(null);
  const [conflict, setConflict] = useState<SampleConflict | null>(null);
  /** The drawing in hand when a note's button is pressed, which may be long after the note came. */
  const open = useRef(draft);
  useEffect(() => {
    open.current = draft;
  });
  /** Versions as this person's own acts left them: undo must not go over what someone else did since. */
  const versions = useRef(new Map<string, number>());

  const settle = (sample: Sample) => {
    versions.current.set(sample.id, sample.version);
    placeSample(queryClient, sample);
    void refreshSamples(queryClient, projectId);
  };
  const remove = async (sampleId: string, version: number) => {
    await deleteSample(sampleId, version);
    versions.current.set(sampleId, version + 1);
    dropSample(queryClient, projectId, sampleId);
    void refreshSamples(queryClient, projectId);
  };
  const closeDraft = (step: DeskStep | null) => {
    setDraft(null);
    setSaveError(null);
    setConflict(null);
    setHistory((now) => (step ? pushStep(closeDrawing(now), step) : closeDrawing(now)));
  };
  const guarded = async (act: () => Promise<void>, onProblem: (error: unknown) => void) => {
    if (isBusy) return;
    setIsBusy(true);
    try {
      await act();
    } catch (error) {
      onProblem(error);
    } finally {
      setIsBusy(false);
    }
  };

  const saveNew = async (wanted: Draft) => {
    const sample = await createSample(projectId, draftToCreate(wanted));
    settle(sample);
    closeDraft({ kind: 'created', sampleId: sample.id, number: sample.number });
    onSelect(sample.id);
    sayDone(`Sample ${sample.number} saved`, undefined, LINE);
  };
  const saveOver = async (wanted: Draft, over: Sample | NonNullable<Draft['base']>) => {
    const sample = await updateSample(wanted.id, fieldsToUpdate(over, wanted));
    settle(sample);
    const { number } = sample;
    const before = sampleFields(over);
    closeDraft({ kind: 'changed', sampleId: sample.id, number, before, after: sampleFields(sample) });
    onSelect(sample.id);
    sayDone(`Sample ${number} saved, version ${sample.version}`, undefined, LINE);
  };
  const meetProblem = (wanted: Draft) => (error: unknown) => {
    if (!(error instanceof ProblemError)) throw error;
    const isGone = error.status === 404 || error.code === 'deleted';
    if (wanted.base && (error.code === 'stale-version' || isGone)) {
      const current = sampleSchema.safeParse(error.current);
      setConflict({ draft: wanted, current: !isGone && current.success ? current.data : null });
      void refreshSamples(queryClient, projectId);
    } else setSaveError(error);
  };

  const save = (wanted: Draft) =>
    guarded(async () => {
      setSaveError(null);
      if (wanted.base === null) await saveNew(wanted);
      else if (isUnchanged(wanted)) closeDraft(null);
      else await saveOver(wanted, wanted.base);
    }, meetProblem(wanted));

  const keepMine = ({ draft: mine, current }: SampleConflict) =>
    guarded(async () => {
      const standing = current ?? (await restoreSample(mine.id, mine.base?.version ?? 1));
      settle(standing);
      if (Object.keys(changedFields(standing, mine)).length === 0) closeDraft(null);
      else await saveOver(mine, standing);
    }, meetProblem(mine));

  const takeTheirs = ({ draft: mine, current }: SampleConflict) => {
    closeDraft(null);
    setHistory((now) => forgetSample(now, mine.id));
    if (current) placeSample(queryClient, current);
    else {
      dropSample(queryClient, projectId, mine.id);
      onSelect(null);
    }
  };

  const reopen = (dropped: Draft) => {
    if (open.current) sayDone('Save or discard the drawing in hand first', { onUndo: () => reopen(dropped) }, LINE);
    else setDraft(dropped);
  };
  const discard = () => {
    if (!draft) return;
    const dropped = draft;
    closeDraft(null);
    const said = dropped.base ? `Changes of sample ${dropped.base.number} discarded` : 'Drawing discarded';
    sayDone(said, { onUndo: () => reopen(dropped) }, LINE);
  };

  const erase = (sample: Sample) =>
    guarded(async () => {
      await remove(sample.id, sample.version);
      closeDraft({ kind: 'deleted', sampleId: sample.id, number: sample.number });
      onSelect(null);
      sayDone(`Sample ${sample.number} deleted`, { onUndo: () => void bringBack(sample) }, LINE);
    }, refuseStale);
  const bringBack = (sample: Sample) =>
    guarded(async () => {
      settle(await restoreSample(sample.id, versions.current.get(sample.id) ?? sample.version));
      setHistory((now) => forgetStep(now, 'deleted', sample.id));
      onSelect(sample.id);
    }, sayProblem);
  const restoreVersion = (sample: Sample, versionNumber: number) =>
    guarded(async () => {
      const restored = await restoreSample(sample.id, versionNumber);
      settle(restored);
      const { id: sampleId, number } = sample;
      const step: DeskStep = {
        kind: 'changed',
        sampleId,
        number,
        before: sampleFields(sample),
        after: sampleFields(restored),
      };
      setHistory((now) => pushStep(now, step));
      sayDone(`Sample ${number} is as in version ${versionNumber} again`, undefined, LINE);
    }, sayProblem);

  const refuseStale = (error: unknown) => {
    sayProblem(error);
    void refreshSamples(queryClient, projectId);
  };

  const putBack = async (sampleId: string) => {
    settle(await restoreSample(sampleId, versions.current.get(sampleId) ?? 1));
    onSelect(sampleId);
  };
  const takeOff = async (sampleId: string) => {
    await remove(sampleId, versions.current.get(sampleId) ?? 1);
    onSelect(null);
  };
  /** Makes the world as it was before (or after) a step. */
  const replay = async (step: DeskStep, isUndo: boolean) => {
    if (step.kind === 'drawn') setDraft(isUndo ? null : step.draft);
    else if (step.kind === 'shaped') {
      if (draft) setDraft({ ...draft, geometry: isUndo ? step.before : step.after });
    } else if (step.kind === 'changed') {
      const [from, to] = isUndo ? [step.after, step.before] : [step.before, step.after];
      const version = versions.current.get(step.sampleId) ?? 1;
      settle(await updateSample(step.sampleId, fieldsToUpdate({ ...from, version }, to)));
      onSelect(step.sampleId);
    } else if ((step.kind === 'created') === isUndo) await takeOff(step.sampleId);
    else await putBack(step.sampleId);
  };
  const walk = (isUndo: boolean) => {
    const next = isUndo ? stepBack(history) : stepForward(history);
    if (!next || !isWithinReach(next.step, draft !== null, isUndo)) return;
    void guarded(
      async () => {
        await replay(next.step, isUndo);
        setHistory(next.history);
        sayDone(describeStep(next.step, isUndo), undefined, LINE);
      },
      (error) => {
        // Someone else changed it since: this step cannot be walked any more, by anyone.
        if ('sampleId' in next.step && error instanceof ProblemError && error.status === 409) {
          const { sampleId } = next.step;
          setHistory((now) => forgetSample(now, sampleId));
        }
        refuseStale(error);
      },
    );
  };

  return {
    isBusy,
    saveError,
    conflict,
    save,
    keepMine,
    takeTheirs,
    discard,
    erase,
    restoreVersion,
    canUndo: isWithinReach(history.past.at(-1), draft !== null, true),
    canRedo: isWithinReach(history.future.at(-1), draft !== null, false),
    undo: () => walk(true),
    redo: () => walk(false),
    clearError: () => setSaveError(null),
    closeConflict: () => setConflict(null),
    /** A drawing was closed: it can be taken back. */
    noteDrawn: (drawn: Draft) => setHistory((now) => pushStep(now, { kind: 'drawn', draft: drawn })),
    noteShaped: (before: Draft['geometry'], after: Draft['geometry']) =>
      setHistory((now) => pushStep(now, { kind: 'shaped', before, after })),
  };
}
