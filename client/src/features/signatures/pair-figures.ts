import type { SignatureSet } from '../../../../shared/contracts/signature.ts';

export type PairFigure = 'jeffriesMatusita' | 'transformedDivergence' | 'bhattacharyya';
type Pair = SignatureSet['pairs'][number];

export const PAIR_FIGURES: Record<PairFigure, { name: string; shortName: string; decimals: number; note: string }> = {
  jeffriesMatusita: {
    name: 'Jeffries–Matusita distance',
    shortName: 'Jeffries–Matusita',
    decimals: 2,
    note: 'sqrt(2(1 − e^−B)): 0 is the same, 1.41 is apart.',
  },
  transformedDivergence: {
    name: 'Transformed divergence',
    shortName: 'Transformed divergence',
    decimals: 2,
    note: '2(1 − e^(−D/8)): 0 is the same, 2 is apart.',
  },
  bhattacharyya: {
    name: 'Bhattacharyya distance',
    shortName: 'Bhattacharyya',
    decimals: 1,
    note: 'B, 0 and up, without a ceiling: each further one and a half means a quarter of the mistakes at most.',
  },
};

/** The pair of two classes whichever comes first; undefined on the diagonal. */
export function pairOf(pairs: readonly Pair[], one: number, two: number): Pair | undefined {
  const [first, second] = one < two ? [one, two] : [two, one];
  return pairs.find((pair) => pair.first === first && pair.second === second);
}

/** How strongly a pair is shaded: the bound on its mistakes against a bound at which nothing can be told. */
export function riskOf({ errorBound }: Pair): number {
  return errorBound === null ? 0 : Math.min(1, errorBound / 0.5);
}
