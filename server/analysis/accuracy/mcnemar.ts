import { erfc, incompleteBeta } from './quantiles.ts';

export interface McNemarResult {
  /** (b − c) / sqrt(b + c); positive when the first map is right more often. */
  z: number;
  chiSquare: number;
  /** Two-sided p of chiSquare with one degree of freedom. */
  pValue: number;
  /** Edwards' continuity correction, (|b − c| − 1)² / (b + c). */
  correctedChiSquare: number;
  correctedPValue: number;
  /** Exact two-sided binomial p. */
  exactPValue: number;
  /** The p to quote: exact under 25 discordant units, chi-square above (common practice, no single source). */
  quoted: 'exact' | 'chi-square';
}

const SMALL_DISCORDANT = 25;

/**
 * Compares two maps judged on the same reference units: `onlyFirstRight` = b, `onlySecondRight` = c.
 *
 * Returns `null` when the maps never differ (b + c = 0).
 * Source: McNemar 1947; Foody 2004, PE&RS 70:627–633 (why kappas of related samples must not be compared as
 * independent).
 * @throws RangeError when a count is not a non-negative integer.
 */
export function compareByMcNemar(onlyFirstRight: number, onlySecondRight: number): McNemarResult | null {
  for (const count of [onlyFirstRight, onlySecondRight]) {
    if (!Number.isInteger(count) || count < 0) throw new RangeError(`A count must be a whole number, got ${count}.`);
  }
  const discordant = onlyFirstRight + onlySecondRight;
  if (discordant === 0) return null;
  const difference = Math.abs(onlyFirstRight - onlySecondRight);
  const z = (onlyFirstRight - onlySecondRight) / Math.sqrt(discordant);
  const correctedChiSquare = Math.max(0, difference - 1) ** 2 / discordant;
  const fewer = Math.min(onlyFirstRight, onlySecondRight);
  // P(X ≤ fewer) of a fair binomial is I_½(n − fewer, fewer + 1).
  const tail = incompleteBeta(discordant - fewer, fewer + 1, 0.5);
  return {
    z,
    chiSquare: z * z,
    pValue: erfc(Math.abs(z) / Math.SQRT2),
    correctedChiSquare,
    correctedPValue: erfc(Math.sqrt(correctedChiSquare / 2)),
    exactPValue: Math.min(1, 2 * tail),
    quoted: discordant < SMALL_DISCORDANT ? 'exact' : 'chi-square',
  };
}
