import { classifierSchema, type ClassifierRecipe } from '../../shared/contracts/run.ts';
import { MAX_TRIALS, type TuningPlan, type TuningTrial } from '../../shared/contracts/tuning.ts';
import { createRng } from '../analysis/sampling/rng.ts';

export interface PlannedTrial {
  number: number;
  classifier: ClassifierRecipe;
  values: TuningTrial['values'];
}

/**
 * The trials of a plan: every combination of the values, the last range changing fastest, or as many of them as wanted, drawn by
 * the seed without one coming twice.
 * @throws RangeError saying which setting or value the classifier does not take, or that there are too many combinations
 */
export function listTrials(classifier: ClassifierRecipe, plan: TuningPlan): PlannedTrial[] {
  const names = plan.ranges.map(({ parameter }) => parameter);
  const doubled = names.find((name, i) => names.indexOf(name) < i);
  if (doubled) throw new RangeError(`“${doubled}” is varied twice. Name each setting once.`);
  const unknown = names.find((name) => name === 'kind' || !(name in classifier));
  if (unknown) throw new RangeError(`The classifier has no setting “${unknown}”.`);

  const nAll = plan.ranges.reduce((product, { values }) => product * new Set(values).size, 1);
  if (plan.method === 'grid' && nAll > MAX_TRIALS) {
    throw new RangeError(
      `${nAll} combinations are too many; at most ${MAX_TRIALS} are tried. Give fewer values, or have some drawn at random.`,
    );
  }
  const chosen =
    plan.method === 'grid' || plan.nTrials >= nAll
      ? Array.from({ length: nAll }, (_, i) => i)
      : drawNumbers(nAll, plan.nTrials, plan.seed);
  return chosen.map((combination, i) => {
    const values = pickValues(plan, combination);
    const settings = Object.fromEntries(names.map((name, at) => [name, values[at]]));
    const parsed = classifierSchema.safeParse({ ...classifier, ...settings });
    if (!parsed.success) {
      const [issue] = parsed.error.issues;
      const name = String(issue?.path[0] ?? '');
      throw new RangeError(`“${name}” cannot be ${JSON.stringify(settings[name])}: ${issue?.message}`);
    }
    return { number: i + 1, classifier: parsed.data, values };
  });
}

function pickValues(plan: TuningPlan, combination: number): TuningTrial['values'] {
  let rest = combination;
  return plan.ranges
    .toReversed()
    .map(({ values }) => {
      const distinct = [...new Set(values)];
      const value = distinct[rest % distinct.length] ?? null;
      rest = Math.floor(rest / distinct.length);
      return value;
    })
    .toReversed();
}

/** So many different numbers below n, ascending. */
function drawNumbers(n: number, count: number, seed: number): number[] {
  const rng = createRng(seed);
  const drawn = new Set<number>();
  // Floyd's method: each of the n is as likely, and none has to be listed.
  for (let top = n - count; top < n; top++) {
    const candidate = rng.nextBelow(top + 1);
    drawn.add(drawn.has(candidate) ? top : candidate);
  }
  return [...drawn].sort((a, b) => a - b);
}
