import type { MapComparison } from '../../shared/contracts/reference.ts';
import { compareMaps, type PairedUnit } from '../analysis/accuracy/compare-maps.ts';
import type { App } from '../app-context.ts';
import type { ReferenceDesign } from '../entities/reference-design.ts';
import type { RunClass } from '../entities/run.ts';
import { Conflict, InvalidInput } from '../errors.ts';
import { loadAnsweredPoints } from './design-settle.ts';
import { haveSamePixels, readCodesAt } from './map-pixels.ts';
import { findPlannedRun } from './planned-run.ts';

const HOW: MapComparison['how'] = [
  {
    formula:
      'd = right on the first − right on the second map, a stratified mean over the points; V(d̄) = V(O₁) + V(O₂) − 2 Cov(O₁, O₂); 95 % interval d̄ ± 1.96 S, p two-sided',
    source: 'Cochran 1977, Sampling Techniques; Foody 2004, PE&RS 70:627–633 (related samples)',
    inputs: [],
  },
  {
    formula: 'McNemar: χ² = (b − c)² / (b + c) on plain counts; exact binomial p under 25 discordant points',
    source: 'McNemar 1947, Psychometrika 12:153–157',
    inputs: [],
  },
];

/**
 * Compares the design's map with that of another run on the same points.
 * @throws Conflict "not-closed"; InvalidInput when the runs are the same, or their maps have different pixels
 */
export async function compareRuns(app: App, design: ReferenceDesign, otherRunId: string): Promise<MapComparison> {
  if (design.state !== 'closed') {
    throw new Conflict(
      'Maps are compared once the design is closed.',
      { found: `it is ${design.state}` },
      'not-closed',
    );
  }
  const refuse = (message: string) => new InvalidInput(message, { errors: [{ path: 'runId', message }] });
  if (otherRunId === design.runId) throw refuse('The design was drawn for this run; choose another.');
  const first = await findPlannedRun(app, design.projectId, design.runId);
  const second = await findPlannedRun(app, design.projectId, otherRunId);
  if (!haveSamePixels(first, second))
    throw refuse('The two maps have different pixels, so their points are not the same.');
  const settled = (await loadAnsweredPoints(app, design.id)).filter((row) => row.settled !== null);
  const secondCodes = await readCodesAt(
    app,
    second,
    settled.map(({ point }) => ({ row: point.pixelRow, column: point.pixelColumn })),
  );
  const units = settled.map(({ point, settled: standing }, i): PairedUnit => ({
    stratum: point.stratum,
    first: indexOfCode(point.mappedCode, first.classes, design.classes),
    second: indexOfCode(secondCodes[i] ?? 0, second.classes, design.classes),
    reference: design.classes.findIndex(({ id }) => id === standing?.classId),
  }));
  const strata = design.strata.map(({ pixels, areaHa }) => ({ size: pixels, areaHa }));
  const result = compareMaps(units, strata);
  if (!result)
    throw new Conflict('A stratum has no point with a settled class, so nothing can be said.', {}, 'no-estimate');
  const { mcNemar, interval } = result;
  return {
    designId: design.id,
    first: { runId: first.id, number: first.number, overall: result.first },
    second: { runId: second.id, number: second.number, overall: result.second },
    n: units.length,
    ...{ difference: result.difference, standardError: result.standardError, covariance: result.covariance },
    ...{ low: interval?.low ?? null, high: interval?.high ?? null, pValue: result.pValue },
    ...{ onlyFirstRight: result.onlyFirstRight, onlySecondRight: result.onlySecondRight },
    mcNemar: mcNemar && {
      ...{ chiSquare: mcNemar.chiSquare, pValue: mcNemar.pValue },
      ...{ exactPValue: mcNemar.exactPValue, quoted: mcNemar.quoted },
    },
    how: HOW,
    cautions: [
      'McNemar’s test weighs all points alike: it speaks for the points, the difference above for the area.',
      'Strata are those of the first map; for the second the estimate is as unbiased, but less precise.',
    ],
  };
}

/** Place of a run's code among the design's classes; one past them for what is no class of the design and never right. */
function indexOfCode(code: number, ofRun: readonly RunClass[], ofDesign: readonly RunClass[]): number {
  const id = ofRun.find((landClass) => landClass.code === code)?.id;
  const index = ofDesign.findIndex((landClass) => landClass.id === id);
  return index < 0 ? ofDesign.length : index;
}
