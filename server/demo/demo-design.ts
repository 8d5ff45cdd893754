import type { App } from '../app-context.ts';
import { ReferencePoint } from '../entities/reference-point.ts';
import type { ReferenceDesign } from '../entities/reference-design.ts';
import { decidePoint, listDisagreements } from '../services/design-adjudication.ts';
import { writeAnswer } from '../services/design-answers.ts';
import { closeDesign, endInterpretation, openDesign } from '../services/design-transitions.ts';
import { createDesign } from '../services/designs.ts';
import { createDemoInterpreter } from './demo-interpreter.ts';
import type { DemoActors } from './demo-project.ts';
import { ISLAND_WIDTH } from './island/island-grid.ts';

const SEED = 2025;
const POINTS = 400;
const LEAST_A_CLASS = 25;

/**
 * A reference design of the demo's run from plan to estimates: two reviewers interpret every point, each with an eye of
 * their own, and the first decides where they differ.
 * @param trueClass of each pixel of the run's scene, 1–10
 */
export async function judgeDemoRun(
  app: App,
  projectId: string,
  runId: string,
  people: DemoActors,
  trueClass: Uint8Array,
): Promise<void> {
  const design = await createDesign(app, projectId, people.lead, {
    ...{ runId, strata: 'map-classes', expected: [], expectedOtherwise: 0.85, name: 'First check' },
    target: { kind: 'total', total: POINTS },
    allocation: { kind: 'minimum', atLeast: LEAST_A_CLASS },
    ...{ seed: SEED, minSpacingMeters: 0, answersPerPoint: 2 },
  });
  const points = await app.db
    .getRepository(ReferencePoint)
    .find({ where: { designId: design.id }, order: { number: 'ASC' } });
  const truthOf = ({ pixelRow, pixelColumn }: ReferencePoint) => trueClass[pixelRow * ISLAND_WIDTH + pixelColumn] ?? 0;
  await openDesign(app, design, people.lead);
  for (const [place, userId] of [people.reviewer, people.reviewerB].entries()) {
    const look = createDemoInterpreter(SEED + place);
    await app.db.transaction(async (manager) => {
      for (const point of points) {
        const { code, alternateCode, ...rest } = look(truthOf(point));
        await writeAnswer(manager, design.id, point.id, userId, {
          classId: classOf(design, code),
          alternateClassId: alternateCode === null ? null : classOf(design, alternateCode),
          ...rest,
          source: 'image',
        });
      }
    });
  }
  const interpreted = await endInterpretation(app, design, people.lead);
  for (const { point } of await listDisagreements(app, interpreted)) {
    const classId = classOf(design, truthOf(point));
    await decidePoint(app, interpreted, point.id, people.reviewer, { classId, note: 'Looked at again on both dates.' });
  }
  await closeDesign(app, interpreted, people.lead, { leaveUnsettled: false });
}

function classOf({ classes }: ReferenceDesign, code: number): string {
  const found = classes.find((one) => one.code === code);
  if (!found) throw new Error(`The demo has no class with code ${code}.`);
  return found.id;
}
