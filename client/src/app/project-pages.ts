import type { RouteObject } from 'react-router-dom';
import { FULL_SCREEN } from './full-screen.ts';
import { lazyPage } from './lazy-page.ts';

/** The pages of a project, each fetched when first opened; paths are within `/projects/:projectId`. */
export const projectPages: RouteObject[] = [
  {
    path: 'overview',
    lazy: lazyPage(() => import('../pages/overview/overview-page.tsx'), 'OverviewPage'),
  },
  {
    path: 'scenes',
    lazy: lazyPage(() => import('../pages/scenes/scenes-page.tsx'), 'ScenesPage'),
  },
  {
    path: 'scenes/:sceneId',
    lazy: lazyPage(() => import('../pages/scene/scene-page.tsx'), 'ScenePage'),
  },
  {
    path: 'scenes/:sceneId/bands',
    lazy: lazyPage(() => import('../pages/scene/scene-bands-page.tsx'), 'SceneBandsPage'),
  },
  {
    path: 'classes',
    lazy: lazyPage(() => import('../pages/classes/classes-page.tsx'), 'ClassesPage'),
  },
  {
    path: 'samples',
    lazy: lazyPage(() => import('../pages/samples/samples-page.tsx'), 'SamplesPage'),
  },
  {
    path: 'samples/blocks',
    lazy: lazyPage(() => import('../pages/blocks/blocks-page.tsx'), 'BlocksPage'),
  },
  {
    path: 'samples/signatures',
    lazy: lazyPage(() => import('../pages/signatures/signatures-page.tsx'), 'SignaturesPage'),
  },
  {
    path: 'runs',
    lazy: lazyPage(() => import('../pages/runs/runs-page.tsx'), 'RunsPage'),
  },
  {
    path: 'runs/new',
    lazy: lazyPage(() => import('../pages/runs/new-run-page.tsx'), 'NewRunPage'),
  },
  {
    path: 'runs/queue',
    lazy: lazyPage(() => import('../pages/queue/queue-page.tsx'), 'QueuePage'),
  },
  {
    path: 'runs/recipes',
    lazy: lazyPage(() => import('../pages/recipes/recipes-page.tsx'), 'RecipesPage'),
  },
  {
    path: 'runs/tunings',
    lazy: lazyPage(() => import('../pages/tunings/tunings-page.tsx'), 'TuningsPage'),
  },
  {
    path: 'runs/tunings/new',
    lazy: lazyPage(() => import('../pages/tunings/new-tuning-page.tsx'), 'NewTuningPage'),
  },
  {
    path: 'runs/tunings/:tuningId',
    lazy: lazyPage(() => import('../pages/tunings/tuning-page.tsx'), 'TuningPage'),
  },
  {
    path: 'runs/:runId/record',
    lazy: lazyPage(() => import('../pages/run-record/run-record-page.tsx'), 'RunRecordPage'),
  },
  {
    path: 'runs/compare',
    lazy: lazyPage(() => import('../pages/run-comparison/run-comparison-page.tsx'), 'RunComparisonPage'),
  },
  {
    path: 'runs/:runId/post-processing',
    lazy: lazyPage(() => import('../pages/post-processing/post-processing-page.tsx'), 'PostProcessingPage'),
  },
  {
    path: 'runs/:runId',
    lazy: lazyPage(() => import('../pages/run/run-page.tsx'), 'RunPage'),
  },
  {
    path: 'accuracy',
    lazy: lazyPage(() => import('../pages/accuracy/accuracy-page.tsx'), 'AccuracyPage'),
  },
  {
    path: 'accuracy/designs/new',
    lazy: lazyPage(() => import('../pages/design-plan/design-plan-page.tsx'), 'DesignPlanPage'),
  },
  {
    path: 'accuracy/designs/:designId',
    lazy: lazyPage(() => import('../pages/design/design-page.tsx'), 'DesignPage'),
  },
  {
    path: 'accuracy/designs/:designId/sheet',
    lazy: lazyPage(() => import('../pages/answer-sheet/answer-sheet-page.tsx'), 'AnswerSheetPage'),
  },
  {
    path: 'accuracy/designs/:designId/check',
    handle: FULL_SCREEN,
    lazy: lazyPage(() => import('../pages/blind-check/blind-check-page.tsx'), 'BlindCheckPage'),
  },
  {
    path: 'accuracy/designs/:designId/decide',
    handle: FULL_SCREEN,
    lazy: lazyPage(() => import('../pages/adjudication/adjudication-page.tsx'), 'AdjudicationPage'),
  },
  {
    path: 'handover',
    lazy: lazyPage(() => import('../pages/handover/handover-page.tsx'), 'HandoverPage'),
  },
  {
    path: 'members',
    lazy: lazyPage(() => import('../pages/members/members-page.tsx'), 'MembersPage'),
  },
];
