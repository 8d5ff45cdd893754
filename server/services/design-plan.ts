import type { Allocation, DesignPlan, PlanDesign, PlanTarget } from '../../shared/contracts/reference.ts';
import { allocateSample, expectPrecision } from '../analysis/accuracy/allocate-sample.ts';
import { planSampleSize, type PlannedStratum } from '../analysis/accuracy/plan-sample-size.ts';
import { normalQuantile } from '../analysis/accuracy/quantiles.ts';
import type { DesignStratum } from '../entities/reference-design.ts';
import { InvalidInput } from '../errors.ts';
import type { PlainStratum } from './design-strata.ts';

/** A variance within a stratum takes two units. */
const LEAST_PER_STRATUM = 2;
const MAX_POINTS = 20_000;
const CURVE_POINTS = 24;

interface Population {
  strata: PlainStratum[];
  planned: PlannedStratum[];
  pixels: number[];
}

function describePopulation(strata: PlainStratum[]): Population {
  return {
    strata,
    planned: strata.map(({ share, expectedUsers }) => ({ areaShare: share, expectedUsers: expectedUsers ?? 0 })),
    pixels: strata.map(({ pixels }) => pixels),
  };
}

/** Shares n points out by a rule, then brings every stratum to two points, or all it has, on top. */
function allocate({ planned, pixels }: Population, n: number, rule: Allocation): number[] {
  const held = pixels.reduce((sum, count) => sum + count, 0);
  const floors = rule.kind === 'minimum' ? pixels.map((count) => Math.min(rule.atLeast, count)) : [1];
  const least = floors.reduce((sum, count) => sum + count, 0);
  const shared = allocateSample(planned, Math.min(held, Math.max(n, least)), rule, pixels);
  return shared.map((count, h) => Math.max(count, Math.min(LEAST_PER_STRATUM, pixels[h] ?? 0)));
}

function sum(values: readonly number[]): number {
  return values.reduce((total, value) => total + value, 0);
}

/** The standard error wanted of overall accuracy; null where a number of points is asked for instead. */
function wantedError(target: PlanTarget): number | null {
  if (target.kind === 'total') return null;
  return target.kind === 'standard-error' ? target.standardError : target.halfWidth / normalQuantile(0.975);
}

/** The least n whose allocation is expected to reach the target; `MAX_POINTS` or the population where none does. */
function findSize(population: Population, target: PlanTarget, rule: Allocation): number {
  const wanted = wantedError(target);
  if (wanted === null) return target.kind === 'total' ? target.total : 0;
  const reaches = (n: number): boolean => {
    const { standardError } = expectPrecision(population.planned, allocate(population, n, rule));
    return standardError !== null && standardError <= wanted;
  };
  let low = 1;
  let high = Math.min(MAX_POINTS, sum(population.pixels));
  while (low < high) {
    const middle = Math.floor((low + high) / 2);
    if (reaches(middle)) high = middle;
    else low = middle + 1;
  }
  return high;
}

const STRATA_TEXT = {
  'map-classes': 'Strata are the classes of the map inside the study area',
  'from-to':
    'Strata are what stays and what changes between the two maps; changes of less than 0.5 % of the map are gathered',
  zones: 'Strata are the zones, and what of the map lies outside them',
};

const RULE_TEXT: Record<Allocation['kind'], string> = {
  equal: 'the same number to each stratum',
  proportional: 'in proportion to area',
  neyman: 'in proportion to area × the standard deviation expected in the stratum (Neyman; Cochran 1977, sec. 5.5)',
  minimum: 'a minimum to each stratum, the rest in proportion to area (Olofsson et al. 2014, sec. 5.1)',
};

/**
 * Plans a stratified random sample of the strata: n for the target, its allocation, and what to expect of it.
 *
 * With `atLeast`, points by stratum of an earlier state of the design, no stratum gets fewer than it has.
 * @throws InvalidInput for more points than may be drawn
 */
export function planDesign(
  of: PlainStratum[],
  input: PlanDesign,
  atLeast: readonly number[] | null = null,
): { plan: DesignPlan; strata: DesignStratum[] } {
  const population = describePopulation(of);
  const { planned, pixels } = population;
  const asked = findSize(population, input.target, input.allocation);
  const points = allocate(population, asked, input.allocation).map((count, h) => Math.max(count, atLeast?.[h] ?? 0));
  const n = sum(points);
  if (n > MAX_POINTS) {
    throw new InvalidInput('The design would have too many points.', {
      ...{ found: `${n} points`, wanted: `at most ${MAX_POINTS}` },
      errors: [{ path: 'target', message: `The design would have ${n} points; at most ${MAX_POINTS} are drawn.` }],
    });
  }
  const precision = expectPrecision(planned, points);
  const strata = population.strata.map((stratum, h): DesignStratum => {
    const interval = stratum.expectedUsers === null ? null : precision.users[h];
    return {
      ...stratum,
      points: points[h] ?? 0,
      expectedLow: interval?.low ?? null,
      expectedHigh: interval?.high ?? null,
    };
  });
  const wanted = wantedError(input.target);
  const nOfTarget = wanted === null ? n : planSampleSize(planned, wanted, sum(pixels));
  return {
    strata,
    plan: {
      strata,
      ...{ n, nOfTarget, standardError: precision.standardError, halfWidth: precision.halfWidth },
      curve: drawCurve(population, n, input.allocation),
      how: [
        `${STRATA_TEXT[typeof input.strata === 'string' ? input.strata : input.strata.kind]}; shares are of true area.`,
        wanted === null
          ? `So many points as were asked for, ${RULE_TEXT[input.allocation.kind]}.`
          : `The least n for which S(O) = √(Σ W² U (1 − U) / (n − 1)) over the strata reaches ${wanted.toPrecision(3)}, shared out ${RULE_TEXT[input.allocation.kind]} (Olofsson et al. 2014, eq. 5 and 13; Cochran 1977).`,
        `Every stratum gets at least ${LEAST_PER_STRATUM} points, without which there is no standard error.`,
      ],
      notes: notePlan(strata, precision.standardError, wanted),
    },
  };
}

/** Points of this plan, with the two a stratum that it always takes; other curves would not meet the plan's n. */
function drawCurve(population: Population, n: number, rule: Allocation): DesignPlan['curve'] {
  const least = sum(allocate(population, 1, rule));
  const most = Math.min(MAX_POINTS, sum(population.pixels), Math.max(2 * n, 200));
  const sizes = Array.from({ length: CURVE_POINTS }, (_, i) =>
    Math.round(least * (most / least) ** (i / (CURVE_POINTS - 1))),
  );
  const curve = new Map<number, DesignPlan['curve'][number]>();
  for (const size of [...sizes, n]) {
    const allocation = allocate(population, size, rule);
    const { standardError, halfWidth } = expectPrecision(population.planned, allocation);
    curve.set(sum(allocation), { n: sum(allocation), standardError, halfWidth });
  }
  return [...curve.values()].sort((a, b) => a.n - b.n);
}

function notePlan(strata: readonly DesignStratum[], standardError: number | null, wanted: number | null): string[] {
  const notes: string[] = [];
  const thin = strata.filter(({ points, classId }) => classId !== null && points < 50);
  if (thin.length > 0) {
    const names = thin.map(({ name, points }) => `${name} (${points})`).join(', ');
    notes.push(`Under the rule of thumb of 50 points a class (Congalton 1991): ${names}.`);
  }
  if (wanted !== null && (standardError === null || standardError > wanted * (1 + 1e-9))) {
    notes.push('The target is not reached with as many points as can be drawn.');
  }
  const whole = strata.filter(({ points, pixels }) => points >= pixels);
  if (whole.length > 0) notes.push(`All pixels are taken of: ${whole.map(({ name }) => name).join(', ')}.`);
  if (strata.some(({ classId }) => classId === null)) {
    notes.push(
      'What the map leaves unclassified is a stratum of its own: it counts as wrong and hides area of every class.',
    );
  }
  return notes;
}
