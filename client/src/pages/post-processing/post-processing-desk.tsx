import { useState } from 'react';
import { Link } from 'react-router-dom';
import type { Polygon } from '../../../../shared/contracts/geometry.ts';
import type { RunPostProcessing } from '../../../../shared/contracts/post-processing.ts';
import type { Run } from '../../../../shared/contracts/run.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { MapPage, Strip, ToolButton, ToolGap } from '../../components/layout/map-page.tsx';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { NotFoundState } from '../../components/ui/access-states.tsx';
import { LeaveGuard } from '../../components/ui/leave-guard.tsx';
import { Slider } from '../../components/ui/slider.tsx';
import { sayDone } from '../../components/ui/toaster.tsx';
import { useZoneLayers } from '../../features/designs/zone-layers.ts';
import { usePreview } from '../../features/post-processing/post-processing-queries.ts';
import { ProcessedMap } from '../../features/post-processing/processed-map.tsx';
import { makeStep, type StepKind } from '../../features/post-processing/step-text.ts';
import { areSameSteps, useStepList } from '../../features/post-processing/use-step-list.ts';
import { runTitle } from '../../features/runs/recipe-text.ts';
import { apiUrl } from '../../lib/fetch-json.ts';
import { useKeys } from '../../lib/keys.ts';
import { paths } from '../../lib/paths.ts';
import { useProject } from '../../lib/project/project-context.ts';
import { useSceneView } from '../../lib/use-scene-view.ts';
import { StepsSlip } from './steps-slip.tsx';

interface PostProcessingDeskProps {
  run: Run;
  list: RunPostProcessing;
  scene: Scene | null;
}

/** The list of steps beside the map it makes, before it is applied. */
export function PostProcessingDesk({ run, list, scene }: PostProcessingDeskProps) {
  const project = useProject();
  const [view] = useSceneView(project.id);
  const applied = list.revisions.find(({ number }) => number === list.applied)?.steps ?? [];
  const steps = useStepList(applied);
  const [shows, setShows] = useState<'before' | 'after'>('after');
  const [opacity, setOpacity] = useState(0.85);
  const [isDrawing, setIsDrawing] = useState(false);
  const mayChange = list.abilities.change;
  const isComplete = steps.steps.every((step) => step.kind !== 'reclass' || step.reason.trim().length >= 3);
  const preview = usePreview(project.id, run.id, steps.steps, mayChange && isComplete);
  const empty = usePreview(project.id, run.id, [], mayChange);
  const layers = useZoneLayers(project.id);
  const isChanged = !areSameSteps(steps.steps, applied);

  const add = (kind: StepKind) => {
    if (kind === 'reclass') setIsDrawing(true);
    else steps.set([...steps.steps, makeStep(kind, run.classes, layers.data?.layers[0]?.id ?? null)]);
  };
  const addEdit = (polygon: Polygon) => {
    setIsDrawing(false);
    const to = run.classes[0]?.id ?? 'unclassified';
    const id = crypto.randomUUID();
    steps.set([
      ...steps.steps,
      { id, isOn: true, kind: 'reclass', polygon, from: 'any', to, reason: '', by: '', at: '' },
    ]);
  };
  useKeys({
    'mod+z': steps.undo,
    'mod+shift+z': steps.redo,
    b: () => setShows((now) => (now === 'before' ? 'after' : 'before')),
    Escape: () => (isDrawing ? setIsDrawing(false) : false),
  });
  const shown = shows === 'before' ? empty.data : preview.data;
  const tiles = shown
    ? apiUrl(`/runs/${run.id}/post-processing/previews/${shown.previewId}/tiles/{z}/{x}/{y}.webp`)
    : apiUrl(`/runs/${run.id}/tiles/{z}/{x}/{y}.webp`, { v: run.classMapSha256 });
  const edits = steps.steps.flatMap((step) =>
    step.kind === 'reclass' && step.isOn ? [{ id: step.id, polygon: step.polygon, label: step.reason || 'Edit' }] : [],
  );
  return (
    <MapPage
      header={
        <PageHeader title="Post-processing" crumb={[runTitle(run), run.name].filter(Boolean).join(' · ')}>
          <Link to={paths.run(project.id, run.id)} className="link text-sm">
            To the run
          </Link>
        </PageHeader>
      }
      map={
        scene?.bounds ? (
          <ProcessedMap
            {...{ run, view, tiles, opacity, edits, isDrawing }}
            scene={{ ...scene, bounds: scene.bounds }}
            onDrawn={addEdit}
            onUnmendable={(reason) => sayDone(reason)}
          />
        ) : (
          <div className="p-6">
            <NotFoundState title="The scene of this run cannot be shown">The list still stands.</NotFoundState>
          </div>
        )
      }
      strip={
        <Strip
          label="Map tools"
          tools={
            isDrawing ? (
              <>
                <span className="px-2">Press corner after corner; press the first one again to close the outline.</span>
                <ToolGap />
                <ToolButton label="Leave" shortcut="Esc" onPress={() => setIsDrawing(false)} />
              </>
            ) : (
              <>
                <ToolButton label="Before" isOn={shows === 'before'} onPress={() => setShows('before')} />
                <ToolButton label="After" shortcut="B" isOn={shows === 'after'} onPress={() => setShows('after')} />
                <Slider
                  className="mx-3 w-36! shrink-0"
                  value={[Math.round(opacity * 100)]}
                  onChange={([percent = 100]) => setOpacity(percent / 100)}
                  min={0}
                  max={100}
                  step={5}
                  labels={['Opacity of the class map']}
                  formatValue={(percent) => `${percent} %`}
                />
                <ToolGap />
                <ToolButton label="Undo" shortcut="⌃Z" isDisabled={!steps.canUndo} onPress={steps.undo} />
                <ToolButton label="Redo" shortcut="⌃⇧Z" isDisabled={!steps.canRedo} onPress={steps.redo} />
              </>
            )
          }
        />
      }
      slip={
        <>
          <StepsSlip
            {...{ run, list, steps, isChanged, isComplete, add }}
            layers={layers.data?.layers ?? []}
            preview={preview.data ?? null}
            previewError={preview.error}
            isCounting={preview.isFetching}
          />
          <LeaveGuard isOn={isChanged} loses="Your changes to the list of steps" />
        </>
      }
    />
  );
}
