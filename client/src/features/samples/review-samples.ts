import type { Sample } from '../../../../shared/contracts/sample.ts';
import { reviewOutcomeSchema } from '../../../../shared/contracts/sample-review.ts';
import { fetchJson } from '../../lib/fetch-json.ts';

export type ReviewAct = 'submit' | 'withdraw' | 'accept' | 'return' | 'reopen';

/** Moves samples along their review; those changed since they were seen are named in the answer, not moved. */
export function reviewSamples(projectId: string, act: ReviewAct, samples: readonly Sample[], comment = '') {
  const seen = samples.map(({ id, version }) => ({ id, version }));
  const isOwn = act === 'submit' || act === 'withdraw';
  return fetchJson(`/projects/${projectId}/samples/${isOwn ? 'submit' : 'review'}`, reviewOutcomeSchema, {
    method: 'POST',
    body: isOwn ? { act, samples: seen } : { act, samples: seen, comment },
  });
}
