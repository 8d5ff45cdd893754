import type { ReactNode } from 'react';
import type { Accuracy } from '../../../../shared/contracts/accuracy.ts';
import { Figure } from '../../components/ui/figure.tsx';
import { formatNumber } from '../../lib/format.ts';
import { HowComputed } from './how-computed.tsx';
import { WHY_NO_DISAGREEMENT, WHY_NO_KAPPA } from './undefined-reasons.ts';

const DISAGREEMENT_SOURCE =
  'Pontius & Millones 2011. A share of the matrix’s own total, so it describes the held-out samples; quantity and allocation disagreement together are what overall accuracy lacks to 1.';

/** The four figures under the matrix. */
export function OverallFigures({ accuracy }: { accuracy: Accuracy }) {
  const { overall, kappa, quantityDisagreement, allocationDisagreement } = accuracy;
  return (
    <div className="grid grid-cols-2 gap-x-6 gap-y-4 border-t border-line pt-3 sm:grid-cols-4">
      <Figure
        label={<>overall accuracy{intervalWords(overall)},</>}
        value={overall.value}
        text={overallText(overall)}
        how={<HowComputed accuracy={accuracy} />}
      />
      <Figure
        label="quantity disagreement,"
        value={quantityDisagreement}
        text={orUndefined(quantityDisagreement)}
        how={
          quantityDisagreement === null ? (
            WHY_NO_DISAGREEMENT
          ) : (
            <How>
              Half the sum, over the classes, of the difference between how much is mapped as a class and how much is of
              it: right places aside, the map has too much of some and too little of others. {DISAGREEMENT_SOURCE}
            </How>
          )
        }
      />
      <Figure
        label="allocation disagreement,"
        value={allocationDisagreement}
        text={orUndefined(allocationDisagreement)}
        how={
          allocationDisagreement === null ? (
            WHY_NO_DISAGREEMENT
          ) : (
            <How>
              What is left once the amounts agree: the right amount of a class, in the wrong places.{' '}
              {DISAGREEMENT_SOURCE}
            </How>
          )
        }
      />
      <Figure
        label={<>kappa{kappa.standardError !== null && `, standard error ${formatNumber(kappa.standardError, 3)}`},</>}
        value={kappa.value}
        text={orUndefined(kappa.value, 2)}
        howLabel="with its caution"
        how={
          <>
            {kappa.value === null && <p className="mb-2">{WHY_NO_KAPPA}</p>}
            {kappa.low !== null && kappa.high !== null && (
              <p className="mb-2">
                95 % interval: {formatNumber(kappa.low, 2)} to {formatNumber(kappa.high, 2)}.
              </p>
            )}
            <p>{kappa.caution}</p>
          </>
        }
      />
    </div>
  );
}

function How({ children }: { children: ReactNode }) {
  return <p>{children}</p>;
}

function orUndefined(value: number | null, decimals = 3): string {
  return value === null ? 'undefined' : formatNumber(value, decimals);
}

/** "0.912 ± 0.021" where the interval lies evenly about the figure; its ends are under it otherwise. */
function overallText({ value, low, high }: Accuracy['overall']): string {
  if (value === null) return 'undefined';
  const figure = formatNumber(value, 3);
  return low !== null && high !== null && isEven(value, low, high)
    ? `${figure} ± ${formatNumber((high - low) / 2, 3)}`
    : figure;
}

function intervalWords({ value, low, high }: Accuracy['overall']): string {
  if (value === null) return '';
  if (low === null || high === null) return ', no interval: too few polygons';
  return isEven(value, low, high) ? '' : `, ${formatNumber(low, 3)} to ${formatNumber(high, 3)}`;
}

function isEven(value: number, low: number, high: number): boolean {
  return Math.abs(value - low - (high - value)) < 0.005;
}
