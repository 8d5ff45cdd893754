import { createPointGrid, type GridPlace } from './point-grid.ts';
import { createRng } from './rng.ts';

/** A place where a sample could be drawn, and how a model stands there. */
export interface CandidatePlace extends GridPlace {
  /** Share of the votes of the leading class less that of the second, 0..1. */
  margin: number;
  /** Class indices of the leading and of the second class. */
  leading: number;
  second: number;
}

export interface PlaceChoice {
  /** Places wanted. */
  count: number;
  /** Least distance between places, and to samples that are there already, pixels; 0 is none. */
  spacingPixels: number;
  /** Where samples are already. */
  taken: readonly GridPlace[];
  /** Decides between places of the same margin, which votes of a forest often have. */
  seed: number;
}

/** From this margin on a place no longer counts towards how much a pair of classes is confused. */
const CONFUSED_BELOW = 0.5;

/**
 * Chooses where to sample next: the places the model is least sure of, shared out among the pairs of classes it confuses, and
 * spread over the ground. Gives indices into `candidates`, the one to be sampled first in front.
 *
 * Smallest margin first is margin sampling (Scheffer, Decomain & Wrobel 2001, Active hidden Markov models for information
 * extraction, IDA 2001, LNCS 2189:309–318). A pair may take at most its part of the places, in proportion to the root of its
 * summed lack of margin (1 − margin over its places below 0.5), so that one large confusion does not take all;
 * places left over after that go to the smallest margins whatever their pair. The parts and the spacing are a plain
 * choice of ours, held against random sampling by a benchmark.
 * @throws RangeError when the number of places or the spacing makes no sense.
 */
export function choosePlaces(candidates: readonly CandidatePlace[], choice: PlaceChoice): number[] {
  const { count, spacingPixels, taken, seed } = choice;
  if (!Number.isInteger(count) || count < 0) throw new RangeError(`A whole number of places is wanted, got ${count}.`);
  if (!(spacingPixels >= 0) || !Number.isFinite(spacingPixels)) {
    throw new RangeError(`A distance of at least 0 pixels is wanted, got ${spacingPixels}.`);
  }
  const parts = shareAmongPairs(candidates, count);
  const grid = createPointGrid(spacingPixels);
  for (const place of taken) grid.add(place);
  const chosen: number[] = [];
  const isChosen = new Uint8Array(candidates.length);
  const nOfPair = new Map<string, number>();
  const order = orderByMargin(candidates, seed);
  for (const bound of ['by pair', 'free'] as const) {
    for (const i of order) {
      if (chosen.length >= count) return chosen;
      if (isChosen[i] === 1) continue;
      const pair = pairOf(candidates[i]);
      const nTaken = nOfPair.get(pair) ?? 0;
      if (bound === 'by pair' && nTaken >= (parts.get(pair) ?? 0)) continue;
      if (spacingPixels > 0 && grid.hasNear(candidates[i])) continue;
      grid.add(candidates[i]);
      isChosen[i] = 1;
      nOfPair.set(pair, nTaken + 1);
      chosen.push(i);
    }
  }
  return chosen;
}

/** Places a pair of classes may take at most, at least one where it is confused at all. */
function shareAmongPairs(candidates: readonly CandidatePlace[], count: number): Map<string, number> {
  const lack = new Map<string, number>();
  for (const place of candidates) {
    if (place.margin >= CONFUSED_BELOW) continue;
    const pair = pairOf(place);
    lack.set(pair, (lack.get(pair) ?? 0) + 1 - place.margin);
  }
  const total = [...lack.values()].reduce((sum, value) => sum + Math.sqrt(value), 0);
  return new Map([...lack].map(([pair, value]) => [pair, Math.ceil((count * Math.sqrt(value)) / total)]));
}

function pairOf({ leading, second }: CandidatePlace): string {
  return leading < second ? `${leading}-${second}` : `${second}-${leading}`;
}

/** Ascending margin; equal margins in a random order, so that no corner of the scene comes first. */
function orderByMargin(candidates: readonly CandidatePlace[], seed: number): Uint32Array {
  const order = createRng(seed).shuffle(Uint32Array.from(candidates, (_, i) => i));
  return order.sort((a, b) => candidates[a].margin - candidates[b].margin);
}
