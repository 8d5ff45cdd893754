import type { DesignFigure, How } from '../../shared/contracts/reference.ts';
import type { ReportedFigure } from '../analysis/accuracy/design-report.ts';

const STEHMAN = 'Stehman 2014, International Journal of Remote Sensing 35:4923–4939';
const OLOFSSON = 'Olofsson et al. 2014, Remote Sensing of Environment 148:42–57';
const WILSON = 'Wilson 1927, Journal of the American Statistical Association 22:209–212';
const VARIANCE =
  'S² = Σ_h W_h² s²_h(y − R·x) / n_h, divided by (Σ_h W_h x̄_h)², over strata h; no finite population correction';

/** What each kind of figure is computed by; `source` names who published it. */
export const FORMULAS = {
  overall: {
    formula: `O = Σ_h W_h ȳ_h with y = 1 where map and reference agree; ${VARIANCE}; 95 % Wilson score interval with O(1 − O)/S² trials`,
    source: `${OLOFSSON}, eq. 1 and 5; ${STEHMAN}; ${WILSON}`,
  },
  users: {
    formula: `U_k = Σ_h W_h ȳ_h / Σ_h W_h x̄_h with x = 1 where the map shows class k and y = 1 where the reference does too; ${VARIANCE}; 95 % Wilson score interval`,
    source: `${OLOFSSON}, eq. 2 and 6; ${STEHMAN}; ${WILSON}`,
  },
  producers: {
    formula: `P_k = Σ_h W_h ȳ_h / Σ_h W_h x̄_h with x = 1 where the reference is class k and y = 1 where the map shows it too; ${VARIANCE}; 95 % Wilson score interval; cautious interval by variance recovery from Wilson intervals of each stratum`,
    source: `${OLOFSSON}, eq. 3 and 7; ${STEHMAN}; Zou & Donner 2008, Statistics in Medicine 27:1693–1702`,
  },
  f1: {
    formula: `F1_k = 2 p_kk / (p_k+ + p_+k), a ratio of stratified means; ${VARIANCE}; 95 % Wilson score interval`,
    source: STEHMAN,
  },
  areaShare: {
    formula: `p_+k = Σ_h W_h (share of the points of stratum h whose reference is class k); S as for a stratified mean; 95 % interval p ± 1.96 S, cut at 0 and 1`,
    source: `${OLOFSSON}, eq. 9 and 10`,
  },
  areaHa: {
    formula: `area = p_+k × total area; 95 % interval area ± 1.96 S(p_+k) × total area, cut at 0 and the total`,
    source: `${OLOFSSON}, eq. 11`,
  },
  kappa: {
    formula: `K = (Σ p_kk − Σ p_k+ p_+k) / (1 − Σ p_k+ p_+k) of the estimated proportions; standard error by its derivatives (Taylor linearisation); 95 % interval K ± 1.96 S`,
    source: `Cohen 1960, Educational and Psychological Measurement 20:37–46; ${STEHMAN}`,
  },
  quantity: {
    formula:
      'Q = ½ Σ_k |p_k+ − p_+k| of the estimated proportions; standard error by its derivatives (Taylor linearisation), undefined where a mistaken class has equal amounts; 95 % interval Q ± 1.96 S, cut at 0 and 1; near 0 the figure leans upwards, since it sums absolute differences',
    source:
      'Pontius & Millones 2011, International Journal of Remote Sensing 32:4407–4429; Woodruff 1971, Journal of the American Statistical Association 66:411–414',
  },
  allocation: {
    formula:
      'A = Σ_k min(p_k+ − p_kk, p_+k − p_kk) of the estimated proportions; standard error by its derivatives (Taylor linearisation), undefined where a mistaken class has equal amounts; 95 % interval A ± 1.96 S, cut at 0 and 1',
    source:
      'Pontius & Millones 2011, International Journal of Remote Sensing 32:4407–4429; Woodruff 1971, Journal of the American Statistical Association 66:411–414',
  },
} as const;

/** A figure of the report with where it comes from. */
export function presentFigure(
  figure: ReportedFigure | null,
  kind: keyof typeof FORMULAS,
  inputs: How['inputs'],
): DesignFigure {
  const how = { ...FORMULAS[kind], inputs };
  if (!figure) return { ...UNDEFINED, how };
  const { value, standardError, low, high, nUnits, isFragile, cautious } = figure;
  return { value, standardError, low, high, n: nUnits, isFragile, cautious, how };
}

const UNDEFINED = {
  value: null,
  standardError: null,
  low: null,
  high: null,
  n: 0,
  isFragile: true,
  cautious: null,
};
