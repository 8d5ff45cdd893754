import type { Overview, Project } from '../../../../shared/contracts/project.ts';
import { formatCount, formatNumber, formatPercent } from '../../lib/format.ts';

/** A sentence in three pieces: before the figure it turns on, the figure, and after it. */
export interface Standing {
  before: string;
  figure: string;
  after: string;
}

type Figures = Overview['figures'];
type Targets = Pick<Project, 'targetOverallAccuracy' | 'targetSamplesPerClass'>;

/** Where the commission stands, in one sentence: the furthest stage that has something to show. */
export function describeStanding(figures: Figures, targets: Targets): Standing {
  const { bestRun, samplesPerClass, sampleCount, sceneCount } = figures;
  if (bestRun && bestRun.overallAccuracy !== null) {
    return describeAccuracy({ ...bestRun, overallAccuracy: bestRun.overallAccuracy }, targets.targetOverallAccuracy);
  }
  if (sampleCount > 0) return describeSamples(samplesPerClass, sampleCount, targets.targetSamplesPerClass);
  if (samplesPerClass.length > 0) {
    return {
      before: 'The scheme has ',
      figure: formatCount(samplesPerClass.length, 'class', 'classes'),
      after: sceneCount > 0 ? '; no sample is drawn yet.' : '; a scene to draw on is still to come.',
    };
  }
  if (sceneCount > 0) {
    return {
      before: 'There ',
      figure: sceneCount === 1 ? 'is one scene' : `are ${formatCount(sceneCount, 'scene')}`,
      after: '; the class scheme is next.',
    };
  }
  return { before: 'The work begins with ', figure: 'a scene', after: ' and a class scheme.' };
}

type Judged = Omit<NonNullable<Figures['bestRun']>, 'overallAccuracy'> & { overallAccuracy: number };

/** A target counts as met or missed only when the whole interval lies on one side of it. */
function judgeTarget({ overallAccuracy, low, high }: Judged, target: number): string {
  if ((low ?? overallAccuracy) >= target) return `the target of ${formatPercent(target)} is met`;
  if ((high ?? overallAccuracy) < target) return `the target of ${formatPercent(target)} is missed`;
  return `whether the target of ${formatPercent(target)} is met is uncertain`;
}

function describeAccuracy(run: Judged, target: number | null): Standing {
  const give =
    run.low !== null && run.high !== null ? `, give or take ${formatNumber(50 * (run.high - run.low), 0)}` : '';
  return {
    before: `Run ${run.number} agrees with `,
    figure: formatPercent(run.overallAccuracy, 1),
    after: ` of the pixels held out from it${give}${target === null ? '.' : `; ${judgeTarget(run, target)}.`}`,
  };
}

function describeSamples(perClass: Figures['samplesPerClass'], sampleCount: number, target: number | null): Standing {
  if (target === null) {
    return {
      before: '',
      figure: formatCount(sampleCount, 'sample'),
      after: ` of ${formatCount(perClass.length, 'class', 'classes')} ${sampleCount === 1 ? 'is' : 'are'} drawn; no map has been made yet.`,
    };
  }
  const reached = perClass.filter(({ samples }) => samples >= target).length;
  const thinnest = perClass.toSorted((a, b) => a.samples - b.samples)[0];
  const rest =
    reached === perClass.length || !thinnest
      ? '.'
      : `; ${thinnest.name} is the thinnest with ${formatNumber(thinnest.samples)}.`;
  return {
    before: '',
    figure: `${formatNumber(reached)} of ${formatCount(perClass.length, 'class', 'classes')}`,
    after: ` ${reached === 1 ? 'has' : 'have'} the ${formatNumber(target)} samples asked for${rest}`,
  };
}
