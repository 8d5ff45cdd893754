import { KAPPA_CAUTION } from '../../shared/constants/cautions.ts';
import type { KappaComparison } from '../../shared/contracts/reference.ts';
import { compareIndependentKappas } from '../analysis/accuracy/compare-maps.ts';
import type { App } from '../app-context.ts';
import type { ReferenceDesign } from '../entities/reference-design.ts';
import { Conflict, InvalidInput } from '../errors.ts';
import { estimateDesign } from './design-estimates.ts';
import { findDesign } from './designs.ts';

/**
 * Compares the design-based kappas of two maps judged by points drawn independently of each other.
 * @throws Conflict "not-closed", "no-estimate"; InvalidInput for the same design, one of another project, or one that shares points
 */
export async function compareKappas(app: App, design: ReferenceDesign, otherId: string): Promise<KappaComparison> {
  const other = await findDesign(app, otherId);
  const refuse = (message: string) => new InvalidInput(message, { errors: [{ path: 'designId', message }] });
  if (other?.projectId !== design.projectId) throw refuse('There is no such design in this project.');
  if (other.id === design.id) throw refuse('A design cannot be compared with itself; choose another.');
  if (other.seed === design.seed || other.augmentsId === design.id || design.augmentsId === other.id) {
    throw refuse(
      'The two designs share points, so their kappas are related; compare the maps on the same points instead.',
    );
  }
  const [first, second] = [await readKappa(app, design), await readKappa(app, other)];
  const tested = compareIndependentKappas(
    { kappa: first.kappa, variance: first.standardError ** 2 },
    { kappa: second.kappa, variance: second.standardError ** 2 },
  );
  if (!tested) throw new Conflict('Neither kappa has a spread, so they cannot be compared.', {}, 'no-estimate');
  return {
    ...{ first, second, z: tested.z, pValue: tested.pValue },
    how: {
      formula: 'z = (K₁ − K₂) / √(S₁² + S₂²), p two-sided',
      source: 'Congalton & Green 1999, Assessing the Accuracy of Remotely Sensed Data (from memory)',
      inputs: [
        { name: 'K₁', value: first.kappa },
        { name: 'S₁', value: first.standardError },
        { name: 'K₂', value: second.kappa },
        { name: 'S₂', value: second.standardError },
      ],
    },
    caution: KAPPA_CAUTION,
  };
}

async function readKappa(app: App, design: ReferenceDesign): Promise<KappaComparison['first']> {
  const { kappa } = await estimateDesign(app, design);
  if (kappa.value === null || kappa.standardError === null) {
    throw new Conflict(`The kappa of design ${design.number} is undefined.`, {}, 'no-estimate');
  }
  return {
    ...{ designNumber: design.number, runNumber: design.run.number },
    ...{ kappa: kappa.value, standardError: kappa.standardError },
  };
}
