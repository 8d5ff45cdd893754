import {
  computeFleissKappa,
  computePairKappa,
  computeRawAgreement,
  type PointAnswers,
} from '../accuracy/interpreter-agreement.ts';

/** A sample of one labeller: its class index and the scene pixels (row-major indices) whose centres lie inside. */
export interface LabelledPixels {
  id: string;
  classIndex: number;
  pixels: Uint32Array;
}

export interface LabellerComparison {
  pixelsOfBoth: number;
  pixelsOfFirstOnly: number;
  pixelsOfSecondOnly: number;
  agreeing: number;
  rawAgreement: number | null;
  cohenKappa: number | null;
  fleissKappa: number | null;
  /** [class of the first][class of the second], pixels. */
  matrix: number[][];
  /** Pairs of samples that share pixels and differ in class, most pixels first. */
  disagreements: { firstId: string; secondId: string; pixels: number }[];
}

/**
 * Compares two labellers over the pixels that samples of both cover. A pixel in several samples of one person counts by the
 * first of them. Pixels of one sample are no independent answers, so no interval is given.
 *
 * Raw agreement, Cohen's and Fleiss' kappa as in interpreter-agreement, a pixel standing for a point: Cohen 1960, Fleiss 1971.
 */
export function compareLabellers(
  first: readonly LabelledPixels[],
  second: readonly LabelledPixels[],
  nClasses: number,
): LabellerComparison {
  const [firstAt, secondAt] = [claimPixels(first), claimPixels(second)];
  const matrix = Array.from({ length: nClasses }, () => new Array<number>(nClasses).fill(0));
  const answers: PointAnswers[] = [];
  const differing = new Map<string, { firstId: string; secondId: string; pixels: number }>();
  let agreeing = 0;
  for (const [pixel, one] of firstAt) {
    const two = secondAt.get(pixel);
    if (!two) continue;
    answers.push([one.classIndex, two.classIndex]);
    matrix[one.classIndex][two.classIndex]++;
    if (one.classIndex === two.classIndex) {
      agreeing++;
      continue;
    }
    const key = `${one.id} ${two.id}`;
    const pair = differing.get(key) ?? { firstId: one.id, secondId: two.id, pixels: 0 };
    pair.pixels++;
    differing.set(key, pair);
  }
  return {
    pixelsOfBoth: answers.length,
    pixelsOfFirstOnly: firstAt.size - answers.length,
    pixelsOfSecondOnly: secondAt.size - answers.length,
    agreeing,
    rawAgreement: computeRawAgreement(answers, nClasses),
    cohenKappa: computePairKappa(answers, nClasses, 0, 1)?.kappa ?? null,
    fleissKappa: computeFleissKappa(answers, nClasses, 2)?.kappa ?? null,
    matrix,
    disagreements: [...differing.values()].sort((a, b) => b.pixels - a.pixels),
  };
}

function claimPixels(samples: readonly LabelledPixels[]): Map<number, LabelledPixels> {
  const at = new Map<number, LabelledPixels>();
  for (const sample of samples) {
    for (const pixel of sample.pixels) if (!at.has(pixel)) at.set(pixel, sample);
  }
  return at;
}
