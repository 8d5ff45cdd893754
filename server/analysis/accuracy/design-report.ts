import type { Estimate } from './combined-ratio.ts';
import { intervalOfShare, normalInterval, type DesignIntervalKind } from './design-interval.ts';
import type { Interval } from './interval.ts';
import type { RecoveredIntervals } from './recovered-interval.ts';
import type { StratifiedEstimate } from './stratified-estimate.ts';

/** A figure of a report; everything is `null` where it is undefined. */
export interface ReportedFigure {
  value: number | null;
  standardError: number | null;
  low: number | null;
  high: number | null;
  /** Sample units behind the denominator. */
  nUnits: number;
  /**
   * Too few units for the large-sample interval: under `MIN_UNITS` behind the denominator, or fewer than `MIN_EXPECTED`
   * effective ones on either side (right and wrong). Coverage of the interval may then be well under what it says.
   */
  isFragile: boolean;
  /**
   * Interval that takes omissions no unit has shown for possible (`recoverIntervals`), for producer's accuracy and areas;
   * the one to quote where the figure is fragile. `null` for other figures and where it is not known.
   */
  cautious: Interval | null;
}

export interface ReportedClass {
  users: ReportedFigure;
  producers: ReportedFigure;
  f1: ReportedFigure;
  areaShare: ReportedFigure;
  /** Area on the ground in hectares. */
  areaHa: ReportedFigure;
  /** Area counted on the map in hectares, and estimate less map. */
  mappedAreaHa: number | null;
  differenceHa: number | null;
}

export interface DesignReport {
  nUnits: number;
  overall: ReportedFigure;
  kappa: ReportedFigure;
  /** Of the estimated population proportions, with the interval ± z·S cut at 0 and 1. */
  quantityDisagreement: ReportedFigure;
  allocationDisagreement: ReportedFigure;
  perClass: ReportedClass[];
}

/** Rule of thumb for a class: Congalton 1991, Remote Sensing of Environment 37:35–46. */
export const MIN_UNITS = 50;
/** n·p and n·(1 − p) of at least 5 for a normal interval of a proportion: common practice, no single source. */
export const MIN_EXPECTED = 5;

export interface DesignReportOptions {
  /** True (ellipsoidal) area of what was estimated, the whole area or the zone, in hectares. */
  totalAreaHa: number;
  /** Area of each class counted on the map, in hectares. */
  mappedAreaHa?: readonly number[];
  confidence?: number;
  /** Of accuracies; see `intervalOfShare`. Areas always take the normal interval, as published. */
  interval?: DesignIntervalKind;
  /** Of the same strata, for the cautious intervals. */
  recovered?: readonly RecoveredIntervals[] | null;
}

/**
 * Puts intervals, hectares and disagreement to a stratified estimate.
 *
 * Areas are share × total area with the half-width z·S of Olofsson et al. 2014, Remote Sensing of Environment 148:42–57,
 * eq. 11, cut at 0 and the total; kappa takes estimate ± z·S. Quantity and allocation disagreement: Pontius & Millones
 * 2011, International Journal of Remote Sensing 32:4407–4429.
 * @throws RangeError when the total area is not positive or mapped areas are not one for each class.
 */
export function reportDesign(
  estimate: StratifiedEstimate,
  { totalAreaHa, mappedAreaHa, confidence = 0.95, interval = 'wilson', recovered = null }: DesignReportOptions,
): DesignReport {
  if (!(totalAreaHa > 0) || !Number.isFinite(totalAreaHa)) throw new RangeError(`The area is ${totalAreaHa} ha.`);
  if (mappedAreaHa && mappedAreaHa.length !== estimate.perClass.length) {
    throw new RangeError(`Got mapped areas of ${mappedAreaHa.length} classes, not ${estimate.perClass.length}.`);
  }
  const share = (figure: Estimate | null, kind = interval): ReportedFigure =>
    toFigure(figure, intervalOfShare(figure, kind, confidence));
  return {
    nUnits: estimate.nUnits,
    overall: share(estimate.overall),
    kappa: toFigure(estimate.kappa, clip(normalInterval(estimate.kappa, confidence), -1, 1)),
    quantityDisagreement: share(estimate.quantity, 'normal'),
    allocationDisagreement: share(estimate.allocation, 'normal'),
    perClass: estimate.perClass.map(({ users, producers, f1, areaShare }, k) => {
      const shareOfArea = share(areaShare, 'normal');
      const mapped = mappedAreaHa?.[k] ?? null;
      const areaHa = areaShare.value * totalAreaHa;
      const { producers: ofProducers = null, areaShare: ofShare = null } = recovered?.[k] ?? {};
      return {
        users: share(users),
        producers: { ...share(producers), cautious: ofProducers },
        f1: share(f1),
        areaShare: { ...shareOfArea, cautious: ofShare },
        areaHa: {
          ...shareOfArea,
          value: areaHa,
          standardError: timesOrNull(shareOfArea.standardError, totalAreaHa),
          low: timesOrNull(shareOfArea.low, totalAreaHa),
          high: timesOrNull(shareOfArea.high, totalAreaHa),
          cautious: ofShare && { low: ofShare.low * totalAreaHa, high: ofShare.high * totalAreaHa },
        },
        mappedAreaHa: mapped,
        differenceHa: mapped === null ? null : areaHa - mapped,
      };
    }),
  };
}

type Ends = Interval | null;

function toFigure(estimate: Estimate | null, interval: Ends): ReportedFigure {
  const { value = null, standardError = null, nUnits = 0, effectiveUnits = 0 } = estimate ?? {};
  const p = Math.min(1, Math.max(0, value ?? 0));
  return {
    value,
    standardError,
    low: interval?.low ?? null,
    high: interval?.high ?? null,
    nUnits,
    isFragile: nUnits < MIN_UNITS || effectiveUnits * Math.min(p, 1 - p) < MIN_EXPECTED,
    cautious: null,
  };
}

function clip(interval: Ends, least: number, most: number): Ends {
  return interval && { low: Math.max(least, interval.low), high: Math.min(most, interval.high) };
}

function timesOrNull(value: number | null, factor: number): number | null {
  return value === null ? null : value * factor;
}
