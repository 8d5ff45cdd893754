import type { Estimates } from '../../../../shared/contracts/reference.ts';

export interface CostlyPair {
  mappedIndex: number;
  referenceIndex: number;
  /** Estimated share of the map's area mapped as the one and being the other. */
  share: number;
  areaHa: number;
  points: number;
}

/** The off-diagonal cells that take most of the area, largest first. */
export function costlyPairs({ proportions, counts, design, columns, rows }: Estimates, most = 5): CostlyPair[] {
  if (!proportions) return [];
  const pairs = proportions.flatMap((row, mappedIndex) =>
    row.flatMap((share, referenceIndex) => {
      const isRight = rows[mappedIndex]?.classId === columns[referenceIndex]?.id;
      if (isRight || share <= 0) return [];
      return [
        {
          ...{ mappedIndex, referenceIndex, share, areaHa: share * design.totalAreaHa },
          points: counts[mappedIndex]?.[referenceIndex] ?? 0,
        },
      ];
    }),
  );
  return pairs.sort((a, b) => b.share - a.share).slice(0, most);
}
