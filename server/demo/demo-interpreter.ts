import type { Confidence } from '../../shared/contracts/sample.ts';
import { createRng, type Rng } from '../analysis/sampling/rng.ts';

/** Classes by code that people take each other's pixels for: what looks alike from above. */
const LOOKS_LIKE: Readonly<Record<number, readonly number[]>> = {
  1: [2],
  2: [1, 3],
  3: [2, 7],
  4: [5, 6],
  5: [4],
  6: [9, 7],
  7: [8, 3],
  8: [7, 10],
  9: [6, 10],
  10: [9, 8],
};

export interface DemoAnswer {
  code: number;
  alternateCode: number | null;
  confidence: Confidence;
  note: string;
  seconds: number;
}

/** How often the eye errs, and how often a second choice is given. */
const ERRS = 0.05;
const HESITATES = 0.12;

/** Someone who looks at points and is mostly right; the same person says the same on every site. */
export function createDemoInterpreter(seed: number): (trueCode: number) => DemoAnswer {
  const rng = createRng(seed);
  return (trueCode) => {
    const others = LOOKS_LIKE[trueCode] ?? [];
    const isWrong = rng.nextFloat() < ERRS && others.length > 0;
    const code = isWrong ? pick(rng, others, trueCode) : trueCode;
    const hesitates = isWrong || rng.nextFloat() < HESITATES;
    const alternates = isWrong ? [trueCode] : others;
    const alternateCode = hesitates && alternates.length > 0 ? pick(rng, alternates, trueCode) : null;
    return {
      code,
      alternateCode: alternateCode === code ? null : alternateCode,
      confidence: hesitates ? 'low' : rng.nextFloat() < 0.5 ? 'high' : 'medium',
      note: isWrong && rng.nextFloat() < 0.3 ? 'Mixed pixel at an edge.' : '',
      seconds: Math.round((8 + 20 * rng.nextFloat()) * 10) / 10,
    };
  };
}

function pick(rng: Rng, codes: readonly number[], otherwise: number): number {
  return codes[rng.nextBelow(codes.length)] ?? otherwise;
}
