import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import type { Sample } from '../../../../shared/contracts/sample.ts';
import { sayDone, sayProblem } from '../../components/ui/toaster.tsx';
import { formatCount } from '../../lib/format.ts';
import { deleteSample } from './delete-sample.ts';
import { restoreSample } from './restore-sample.ts';
import { type ReviewAct, reviewSamples } from './review-samples.ts';
import { dropSample, placeSample, refreshSamples } from './samples-query.ts';

const DONE: Record<ReviewAct, string> = {
  submit: 'submitted',
  withdraw: 'taken back',
  accept: 'accepted',
  return: 'returned',
  reopen: 'up for review again',
};
/** What takes an act back; taking back what was submitted needs no way back of its own. */
const BACK: Partial<Record<ReviewAct, ReviewAct>> = { submit: 'withdraw', accept: 'reopen', return: 'reopen' };
const AT_ONCE = 6;

/** Review acts on one sample or many, each with a way back. */
export function useReview(projectId: string) {
  const queryClient = useQueryClient();
  const [isBusy, setIsBusy] = useState(false);
  const guarded = async (work: () => Promise<void>) => {
    setIsBusy(true);
    try {
      await work();
    } catch (error) {
      sayProblem(error);
    } finally {
      setIsBusy(false);
      await refreshSamples(queryClient, projectId);
    }
  };
  const review = (act: ReviewAct, samples: readonly Sample[], comment = '', isUndo = false): Promise<void> =>
    guarded(async () => {
      const outcome = await reviewSamples(projectId, act, samples, comment);
      for (const sample of outcome.samples) placeSample(queryClient, sample);
      const back = isUndo ? undefined : BACK[act];
      const moved = outcome.samples;
      sayDone(
        [nameSamples(moved, DONE[act]), describeRefused(outcome.refused.length)].filter(Boolean).join('; '),
        back && moved.length > 0 ? { onUndo: () => void review(back, moved, '', true) } : undefined,
        'review',
      );
    });
  const erase = (samples: readonly Sample[]): Promise<void> =>
    guarded(async () => {
      const gone: Sample[] = [];
      await inTurns(samples, async (sample) => {
        try {
          await deleteSample(sample.id, sample.version);
        } catch (error) {
          sayProblem(error);
          return;
        }
        gone.push(sample);
        dropSample(queryClient, projectId, sample.id);
      });
      const bringBack = () =>
        void guarded(() => inTurns(gone, async (sample) => placeSample(queryClient, await restore(sample))));
      sayDone(nameSamples(gone, 'deleted'), gone.length > 0 ? { onUndo: bringBack } : undefined, 'review');
    });
  return { isBusy, review, erase };
}

/** The version before the deletion is the sample as it was. */
const restore = (sample: Sample) => restoreSample(sample.id, sample.version);

/** A few requests at a time, so that the server answers others meanwhile. */
async function inTurns<T>(items: readonly T[], work: (item: T) => Promise<void>): Promise<void> {
  for (let from = 0; from < items.length; from += AT_ONCE)
    await Promise.all(items.slice(from, from + AT_ONCE).map(work));
}

function nameSamples(samples: readonly Sample[], done: string): string {
  const [first] = samples;
  if (!first) return `Nothing ${done}`;
  return samples.length === 1 ? `Sample ${first.number} ${done}` : `${formatCount(samples.length, 'sample')} ${done}`;
}

function describeRefused(n: number): string {
  if (n === 0) return '';
  return `${formatCount(n, 'sample')} left as ${n === 1 ? 'it is' : 'they are'}: changed meanwhile, or not in a state for it`;
}
