/** The memory one block of rows is classified in. */
export interface WalkBlock {
  /** Row-major ranks of the features among the forest's thresholds. */
  ranks: Int32Array;
  /** Row-major vote counts, nClasses a row. */
  votes: Uint16Array;
  /** Votes of the leading class of each row. */
  best: Uint16Array;
  /** Leading class of each row. */
  winner: Uint8Array;
}

/**
 * Walks one tree with rows 0..nRows of a block, rounded up to eight, and counts its votes.
 *
 * steps[2i] is (rank of node i's threshold << 8) | feature, steps[2i + 1] its left child; a leaf points at itself.
 * Eight rows go down together, so that the processor waits for eight memory reads at once instead of one; a step has
 * no branch: the sign of (node's rank − row's rank) picks the child. Rows past nRows are walked with whatever ranks
 * stand there.
 */
export function walkTree(
  steps: Int32Array,
  leafClass: Uint8Array,
  root: number,
  block: WalkBlock,
  nRows: number,
  nFeatures: number,
  nClasses: number,
): void {
  const { ranks, votes, best, winner } = block;
  for (let row = 0; row < nRows; row += 8) {
    const r0 = row * nFeatures;
    const r1 = r0 + nFeatures;
    const r2 = r1 + nFeatures;
    const r3 = r2 + nFeatures;
    const r4 = r3 + nFeatures;
    const r5 = r4 + nFeatures;
    const r6 = r5 + nFeatures;
    const r7 = r6 + nFeatures;
    let a = root;
    let b = root;
    let c = root;
    let d = root;
    let e = root;
    let f = root;
    let g = root;
    let h = root;
    for (;;) {
      const wa = steps[a << 1];
      const wb = steps[b << 1];
      const wc = steps[c << 1];
      const wd = steps[d << 1];
      const we = steps[e << 1];
      const wf = steps[f << 1];
      const wg = steps[g << 1];
      const wh = steps[h << 1];
      const na = steps[(a << 1) + 1] + (((wa >> 8) - ranks[r0 + (wa & 255)]) >>> 31);
      const nb = steps[(b << 1) + 1] + (((wb >> 8) - ranks[r1 + (wb & 255)]) >>> 31);
      const nc = steps[(c << 1) + 1] + (((wc >> 8) - ranks[r2 + (wc & 255)]) >>> 31);
      const nd = steps[(d << 1) + 1] + (((wd >> 8) - ranks[r3 + (wd & 255)]) >>> 31);
      const ne = steps[(e << 1) + 1] + (((we >> 8) - ranks[r4 + (we & 255)]) >>> 31);
      const nf = steps[(f << 1) + 1] + (((wf >> 8) - ranks[r5 + (wf & 255)]) >>> 31);
      const ng = steps[(g << 1) + 1] + (((wg >> 8) - ranks[r6 + (wg & 255)]) >>> 31);
      const nh = steps[(h << 1) + 1] + (((wh >> 8) - ranks[r7 + (wh & 255)]) >>> 31);
      if (((na ^ a) | (nb ^ b) | (nc ^ c) | (nd ^ d) | (ne ^ e) | (nf ^ f) | (ng ^ g) | (nh ^ h)) === 0) break;
      a = na;
      b = nb;
      c = nc;
      d = nd;
      e = ne;
      f = nf;
      g = ng;
      h = nh;
    }
    vote(row + 0, leafClass[a]);
    vote(row + 1, leafClass[b]);
    vote(row + 2, leafClass[c]);
    vote(row + 3, leafClass[d]);
    vote(row + 4, leafClass[e]);
    vote(row + 5, leafClass[f]);
    vote(row + 6, leafClass[g]);
    vote(row + 7, leafClass[h]);
  }

  function vote(row: number, classIndex: number): void {
    const count = ++votes[row * nClasses + classIndex];
    if (count > best[row]) {
      best[row] = count;
      winner[row] = classIndex;
    }
  }
}
