import type { Accuracy } from '../../../../shared/contracts/accuracy.ts';
import { UNIT_NOUN } from './describe-accuracy.ts';

type ClassFigures = Accuracy['perClass'][number];

/** Why a class's user's accuracy is undefined: nothing to divide by. */
export function whyNoUsers(unit: Accuracy['unit']): string {
  return `no held-out ${UNIT_NOUN[unit].one} is mapped as it`;
}

/** Why a class's producer's accuracy is undefined. */
export function whyNoProducers(unit: Accuracy['unit']): string {
  return `no mapped held-out ${UNIT_NOUN[unit].one} is of it`;
}

/** Why F1 is undefined. */
export function whyNoF1({ users, producers }: Pick<ClassFigures, 'users' | 'producers'>): string {
  if (users.value === null) return 'user’s accuracy is undefined';
  if (producers.value === null) return 'producer’s accuracy is undefined';
  return 'both accuracies are 0';
}

/** Why kappa is undefined. */
export const WHY_NO_KAPPA =
  'Kappa is undefined here: with nothing in the matrix, or all of it in one class, its denominator is 0.';

/** Why the disagreements are undefined. */
export const WHY_NO_DISAGREEMENT = 'Undefined: the matrix is empty.';
