import type { Estimate } from '../../../../shared/contracts/accuracy.ts';

/** `uncertain`: the interval holds the target, or there is no interval; `undefined`: there is no figure. */
export type TargetVerdict = 'met' | 'missed' | 'uncertain' | 'undefined';

/** Holds a figure against what the commission asks for; a target inside the interval is neither met nor missed. */
export function judgeTarget({ value, low, high }: Estimate, target: number): TargetVerdict {
  if (value === null) return 'undefined';
  if (low === null || high === null) return 'uncertain';
  if (low >= target) return 'met';
  return high < target ? 'missed' : 'uncertain';
}
