import type { BlindPoint, CellPoint, Design, Disagreement, NextPoint } from '../../shared/contracts/reference.ts';
import type { ReferenceAnswer as AnswerContract } from '../../shared/contracts/reference.ts';
import type { ReferenceAnswer } from '../entities/reference-answer.ts';
import type { ReferenceDesign } from '../entities/reference-design.ts';
import type { ReferencePoint } from '../entities/reference-point.ts';
import { can } from '../policies/policy-table.ts';
import type { Viewer } from '../policies/viewer.ts';
import type { OwnPoint, OwnProgress } from '../services/design-answers.ts';
import { describeSpacing } from '../services/design-draw.ts';
import { placePoint } from '../services/design-places.ts';
import type { DesignProgress } from '../services/design-progress.ts';
import type { AnsweredPoint } from '../services/design-settle.ts';
import type { PlacedScene } from '../services/run-scene.ts';

/** Strata and seed, from which mapped classes could be told, are left out where maps are withheld from the viewer. */
export function presentDesign(
  design: ReferenceDesign,
  viewer: Viewer,
  { progress, isMapWithheld }: { progress: DesignProgress; isMapWithheld: boolean },
): Design {
  const { state } = design;
  const plans = can('design.plan', viewer.roles);
  return {
    ...{ id: design.id, projectId: design.projectId, runId: design.runId, runNumber: design.run.number },
    ...{ number: design.number, name: design.name, state, n: progress.points, classes: design.classes },
    ...{ answersPerPoint: design.answersPerPoint, minSpacingMeters: design.minSpacingMeters },
    strataKind: design.plan.strata,
    ...{ spacingEffect: describeSpacing(design.minSpacingMeters), digest: design.digest },
    augmentsId: design.augmentsId,
    strata: isMapWithheld ? null : design.strata,
    seed: isMapWithheld ? null : design.seed,
    progress,
    createdBy: design.createdBy ? { id: design.createdBy.id, name: design.createdBy.name } : null,
    createdAt: design.createdAt.toISOString(),
    openedAt: design.openedAt?.toISOString() ?? null,
    closedAt: design.closedAt?.toISOString() ?? null,
    abilities: {
      change: plans && state === 'draft',
      delete: plans && state === 'draft',
      augment: plans && (state === 'draft' || state === 'closed') && !isMapWithheld,
      open: plans && state === 'draft',
      interpret: can('design.interpret', viewer.roles) && state === 'open',
      endInterpretation: plans && state === 'open',
      adjudicate: can('design.adjudicate', viewer.roles) && state === 'adjudicating',
      close: plans && state === 'adjudicating',
      readEstimates: can('design.estimates', viewer.roles) && state === 'closed' && !isMapWithheld,
      exportPoints: state !== 'closed' || !isMapWithheld,
    },
  };
}

function presentAnswer(answer: ReferenceAnswer & { classId: string }): AnswerContract {
  const { classId, alternateClassId, confidence, note, source, answeredAt } = answer;
  return { classId, alternateClassId, confidence, note, source, answeredAt: answeredAt.toISOString() };
}

/** A point as its interpreter may see it: place and own answer, and nothing of the map or of others. */
export function presentBlindPoint(
  design: ReferenceDesign,
  placed: PlacedScene,
  { point, own, refusal, place, previousNumber, nextNumber }: OwnPoint,
  progress: OwnProgress,
): BlindPoint {
  return {
    ...presentPlace(design, placed, point),
    designId: design.id,
    answer:
      own && own.classId !== null
        ? presentAnswer({ ...own, classId: own.classId } as ReferenceAnswer & { classId: string })
        : null,
    skipped: own !== null && own.classId === null,
    takesAnswer: refusal === null,
    ...{ refusal, place, previousNumber, nextNumber, progress },
  };
}

function presentPlace(design: ReferenceDesign, placed: PlacedScene, point: ReferencePoint): Disagreement['point'] {
  return { id: point.id, number: point.number, sceneId: design.run.sceneId, ...placePoint(placed, point) };
}

export function presentNextPoint(
  design: ReferenceDesign,
  placed: PlacedScene,
  { next, progress }: { next: OwnPoint | null; progress: OwnProgress },
): NextPoint {
  return { point: next && presentBlindPoint(design, placed, next, progress), progress };
}

/** A point of a closed design, with what was said of it. */
export function presentCellPoint(
  design: ReferenceDesign,
  placed: PlacedScene,
  { point, answers, settled }: AnsweredPoint,
): CellPoint {
  return {
    ...presentPlace(design, placed, point),
    settledBy: settled?.by ?? 'agreement',
    answers: answers.map(presentAnswerOf),
    note: point.decisionNote,
  };
}

function presentAnswerOf(answer: AnsweredPoint['answers'][number]): Disagreement['answers'][number] {
  return { ...presentAnswer(answer), by: answer.user ? { id: answer.user.id, name: answer.user.name } : null };
}

/** A disputed point with everybody's answers, but still without the mapped class. */
export function presentDisagreement(
  design: ReferenceDesign,
  placed: PlacedScene,
  { point, answers }: AnsweredPoint,
): Disagreement {
  const { decisionClassId, decisionAlternateClassId, decisionNote, decidedBy, decidedAt } = point;
  return {
    point: presentPlace(design, placed, point),
    answers: answers.map(presentAnswerOf),
    decision:
      decisionClassId !== null && decidedAt !== null
        ? {
            ...{ classId: decisionClassId, alternateClassId: decisionAlternateClassId, note: decisionNote },
            decidedBy: decidedBy ? { id: decidedBy.id, name: decidedBy.name } : null,
            decidedAt: decidedAt.toISOString(),
          }
        : null,
  };
}
