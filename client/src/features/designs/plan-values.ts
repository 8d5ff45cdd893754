import { type Allocation, type PlanDesign, planDesignSchema } from '../../../../shared/contracts/reference.ts';
import type { CreateDesignInput } from './create-design.ts';

/** The planner's fields as they are typed; null is an empty field. Shares are in per cent. */
export interface PlanValues {
  runId: string;
  name: string;
  strata: 'map-classes' | 'from-to' | 'zones';
  /** The earlier map, and the layer, where strata come from them. */
  fromRunId: string | null;
  layerId: string | null;
  target: 'half-width' | 'standard-error' | 'total';
  halfWidthPercent: number | null;
  standardErrorPercent: number | null;
  total: number | null;
  allocation: Allocation['kind'];
  atLeast: number | null;
  /** By class id. */
  expectedPercent: Readonly<Record<string, number | null>>;
  otherwisePercent: number | null;
  minSpacingMeters: number | null;
  answersPerPoint: number | null;
  /** Empty draws a seed at random. */
  seed: number | null;
}

/** A plan that most commissions can live with: ± 3 % overall, at least 50 points a class, two people a point. */
export function defaultPlan(runId: string): PlanValues {
  return {
    ...{ runId, name: '', strata: 'map-classes', fromRunId: null, layerId: null },
    ...{ target: 'half-width', halfWidthPercent: 3, standardErrorPercent: 1.5, total: 500 },
    ...{ allocation: 'minimum', atLeast: 50, expectedPercent: {}, otherwisePercent: 80 },
    ...{ minSpacingMeters: 0, answersPerPoint: 2, seed: null },
  };
}

const ofPercent = (percent: number | null) => (percent === null ? Number.NaN : percent / 100);
const orNaN = (value: number | null) => value ?? Number.NaN;

function planTarget(values: PlanValues): PlanDesign['target'] {
  switch (values.target) {
    case 'half-width':
      return { kind: 'half-width', halfWidth: ofPercent(values.halfWidthPercent) };
    case 'standard-error':
      return { kind: 'standard-error', standardError: ofPercent(values.standardErrorPercent) };
    case 'total':
      return { kind: 'total', total: orNaN(values.total) };
  }
}

function planStrata({ strata, fromRunId, layerId }: PlanValues) {
  if (strata === 'from-to') return { kind: 'from-to', runId: fromRunId };
  return strata === 'zones' ? { kind: 'zones', layerId } : 'map-classes';
}

/** The plan as it is sent, or what is wrong with a field of it. */
export function readPlan(values: PlanValues): { plan: PlanDesign; problem: null } | { plan: null; problem: string } {
  const parsed = planDesignSchema.safeParse({
    runId: values.runId,
    strata: planStrata(values),
    // Only strata that are classes have an accuracy of their own to expect.
    expected: Object.entries(values.strata === 'map-classes' ? values.expectedPercent : {}).flatMap(
      ([classId, percent]) => (percent === null ? [] : [{ classId, users: percent / 100 }]),
    ),
    expectedOtherwise: ofPercent(values.otherwisePercent),
    target: planTarget(values),
    allocation:
      values.allocation === 'minimum'
        ? { kind: 'minimum', atLeast: orNaN(values.atLeast) }
        : { kind: values.allocation },
  });
  if (parsed.success) return { plan: parsed.data, problem: null };
  const path = parsed.error.issues[0]?.path.join('.') ?? '';
  return { plan: null, problem: PROBLEMS.find(([start]) => path.startsWith(start))?.[1] ?? OTHERWISE };
}

const OTHERWISE = 'A figure of the plan is missing or out of range.';
const PROBLEMS: readonly (readonly [string, string])[] = [
  ['strata', 'Choose what the points are drawn from.'],
  ['target.halfWidth', 'The half-width wanted is 0.2 to 50 %.'],
  ['target.standardError', 'The standard error wanted is 0.1 to 25 %.'],
  ['target.total', 'The number of points is a whole number from 2 to 20 000.'],
  ['allocation.atLeast', 'The minimum a class is a whole number from 2 to 5000.'],
  ['expected', 'Expected user’s accuracies are 0 to 100 %.'],
];

export function createInput(plan: PlanDesign, values: PlanValues): CreateDesignInput {
  return {
    ...plan,
    name: values.name.trim(),
    minSpacingMeters: values.minSpacingMeters ?? 0,
    answersPerPoint: values.answersPerPoint ?? 2,
    ...(values.seed !== null && { seed: values.seed }),
  };
}
