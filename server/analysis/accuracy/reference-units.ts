import { addToConfusionMatrix, createConfusionMatrix } from './confusion-matrix.ts';
import type { StratumSample } from './stratified-estimate.ts';

/** A reference point of a design, with its answer. All are indices from 0. */
export interface ReferenceUnit {
  stratum: number;
  mapped: number;
  /** The interpreter's first choice. */
  reference: number;
  /** Second choice, where the interpreter gave one. */
  alternate?: number | null;
  /** Zone the point lies in, where zones are looked at. */
  zone?: number | null;
}

/** What a stratum holds: units N_h and, if strata are to weigh by it, true area. */
export interface StratumSize {
  size: number;
  areaHa?: number;
}

/**
 * `primary`: the map is right when it shows the first choice. `either`: also when it shows the alternate, which then
 * stands in for the first choice. `either` is lenient and makes the reference depend on the map: quote it beside
 * `primary`, and take no areas from it.
 */
export type LabelRule = 'primary' | 'either';

/** The class a unit counts as on the ground under a rule. */
export function referenceUnder(unit: ReferenceUnit, rule: LabelRule): number {
  return rule === 'either' && unit.alternate === unit.mapped ? unit.mapped : unit.reference;
}

/**
 * Counts reference units by stratum, as `estimateStratified` takes them; with `zone` only those inside it, the others of
 * their stratum going to `nOutside`.
 * @throws RangeError when a stratum or a class index is out of range.
 */
export function countReferenceUnits(
  units: readonly ReferenceUnit[],
  strata: readonly StratumSize[],
  nClasses: number,
  { labels = 'primary', zone = null }: { labels?: LabelRule; zone?: number | null } = {},
): StratumSample[] {
  const samples = strata.map(({ size, areaHa }) => ({
    size,
    areaHa,
    counts: createConfusionMatrix(nClasses),
    nOutside: 0,
  }));
  for (const unit of units) {
    const sample = samples[unit.stratum];
    if (!sample) throw new RangeError(`A unit is of stratum ${unit.stratum}, expected 0..${strata.length - 1}.`);
    if (zone !== null && unit.zone !== zone) sample.nOutside++;
    else addToConfusionMatrix(sample.counts, unit.mapped, referenceUnder(unit, labels));
  }
  return samples;
}
