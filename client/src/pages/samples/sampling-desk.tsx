import { ChartSpline, Grid2x2, List, PenTool } from 'lucide-react';
import { useRef } from 'react';
import { Link } from 'react-router-dom';
import type { Block } from '../../../../shared/contracts/block.ts';
import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import type { Sample } from '../../../../shared/contracts/sample.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { MapPage } from '../../components/layout/map-page.tsx';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { CompositeControl } from '../../components/map/composite-control.tsx';
import { SceneChoice } from '../../components/map/scene-choice.tsx';
import type { ShapeEditorHandle } from '../../components/map/shape-editor.tsx';
import { StretchControl } from '../../components/map/stretch-control.tsx';
import { Button, buttonClass } from '../../components/ui/button.tsx';
import { Tooltip } from '../../components/ui/tooltip.tsx';
import { ConflictDialog } from '../../features/samples/conflict-dialog.tsx';
import { BlockInWork, BlockOutlines } from '../../features/samples/desk-blocks.tsx';
import { DeskMap } from '../../features/samples/desk-map.tsx';
import { DeskSlip } from '../../features/samples/desk-slip.tsx';
import { DeskStrip } from '../../features/samples/desk-strip.tsx';
import { drawToolOf } from '../../features/samples/desk-tool.ts';
import { KeyList } from '../../features/samples/key-list.tsx';
import { useDraftMeasure } from '../../features/samples/measure-query.ts';
import { EditedByOthers, PresenceMarks } from '../../features/samples/presence-marks.tsx';
import { SampleList } from '../../features/samples/sample-list.tsx';
import { useBlockWork } from '../../features/samples/use-block-work.ts';
import { useDesk } from '../../features/samples/use-desk.ts';
import { toolHelp, useDeskKeys } from '../../features/samples/use-desk-keys.ts';
import { usePresence } from '../../features/samples/use-presence.ts';
import { useKeys } from '../../lib/keys.ts';
import { paths } from '../../lib/paths.ts';
import { useProject } from '../../lib/project/project-context.ts';
import { useSceneView } from '../../lib/use-scene-view.ts';

export interface SamplingDeskProps {
  viewerId: string;
  /** Ready ones, at least one. */
  scenes: readonly Scene[];
  /** At least one. */
  classes: readonly LandClass[];
  samples: readonly Sample[];
  blocks: readonly Block[];
}

/** The map with its samples, the key strip, the list and the slip. */
export function SamplingDesk({ viewerId, scenes, classes, samples, blocks }: SamplingDeskProps) {
  const project = useProject();
  const editor = useRef<ShapeEditorHandle>(null);
  const work = useBlockWork(project.id, viewerId, blocks);
  const firstPlace = work.current?.geometry ?? null;
  const desk = useDesk({ project, viewerId, scenes, classes, samples, firstPlace, editor });
  const people = usePresence(project.id, viewerId, desk.draft?.base ? desk.draft.id : null);
  useKeys({ b: () => work.next(desk.goToPlace) });
  const [view, setView] = useSceneView(project.id);
  const measure = useDraftMeasure(project.id, desk.scene, desk.draft?.geometry ?? null);
  const refusal = desk.draft ? (measure.data?.refusal ?? null) : null;
  useDeskKeys(desk, editor, refusal === null);
  const focusMap = () => document.querySelector<HTMLElement>('.leaflet-container')?.focus({ preventScroll: true });
  const isDrawing = drawToolOf(desk.tool) !== null && desk.draft === null;
  return (
    <>
      <MapPage
        header={
          <PageHeader
            title="Sampling desk"
            crumb={
              work.current && (
                <BlockInWork
                  block={work.current}
                  viewerId={viewerId}
                  nClasses={classes.length}
                  isPending={work.isMoving}
                  onDone={() => work.finish(desk.goToPlace)}
                />
              )
            }
            action={
              <>
                <PresenceMarks people={people} />
                <Tooltip text="Blocks">
                  <Link to={paths.blocks(project.id)} aria-label="Blocks" className={buttonClass('secondary', 'sm')}>
                    <Grid2x2 aria-hidden />
                  </Link>
                </Tooltip>
                <Tooltip text="Signatures">
                  <Link
                    to={paths.signatures(project.id)}
                    aria-label="Signatures"
                    className={buttonClass('secondary', 'sm')}
                  >
                    <ChartSpline aria-hidden />
                  </Link>
                </Tooltip>
                <Button
                  size="sm"
                  kind={desk.isListOpen ? 'strong' : 'secondary'}
                  aria-pressed={desk.isListOpen}
                  aria-keyshortcuts="M"
                  icon={<List aria-hidden />}
                  onClick={() => desk.setIsListOpen(!desk.isListOpen)}
                >
                  List
                </Button>
                {desk.canDraw && (
                  <Button
                    kind="primary"
                    icon={<PenTool aria-hidden />}
                    disabled={desk.draft !== null}
                    aria-keyshortcuts="P"
                    onClick={() => {
                      desk.chooseTool(isDrawing ? 'select' : 'polygon');
                      focusMap();
                    }}
                  >
                    {isDrawing ? 'Stop drawing' : 'Draw sample'}
                  </Button>
                )}
              </>
            }
          >
            <CompositeControl bands={desk.scene.bands} view={view} onChange={setView} />
            <SceneChoice scenes={scenes} value={desk.scene.id} onChange={desk.chooseScene} />
            <StretchControl stretch={view.stretch} onChange={(stretch) => setView({ ...view, stretch })} />
          </PageHeader>
        }
        list={
          desk.isListOpen && (
            <SampleList
              projectId={project.id}
              viewerId={viewerId}
              blocks={blocks}
              samples={desk.sceneSamples}
              shown={desk.shown}
              classes={classes}
              filter={desk.filter}
              onFilter={desk.setFilter}
              selectedId={desk.selected?.id ?? null}
              onSelect={desk.goTo}
              onClose={() => desk.setIsListOpen(false)}
            />
          )
        }
        map={
          <DeskMap desk={desk} view={view} editor={editor} refusal={refusal}>
            <BlockOutlines blocks={blocks} current={work.current} />
            <EditedByOthers people={people} samples={samples} />
          </DeskMap>
        }
        strip={
          <DeskStrip
            canDraw={desk.canDraw}
            whyNot="You can look but not draw: ask the lead for the labeller role."
            help={toolHelp(desk)}
            tool={desk.tool}
            onTool={(tool) => {
              desk.chooseTool(tool);
              focusMap();
            }}
            keys={classes.map((one) => ({ ...one, count: one.sampleCount }))}
            target={project.targetSamplesPerClass}
            classId={desk.canDraw ? desk.classId : desk.filter.classId}
            onClass={(id) => {
              desk.chooseClass(id);
              focusMap();
            }}
            canUndo={desk.canUndo}
            canRedo={desk.canRedo}
            onUndo={desk.undo}
            onRedo={desk.redo}
            onKeyList={() => desk.setIsKeyListOpen(true)}
          />
        }
        slip={<DeskSlip desk={desk} viewerId={viewerId} scenes={scenes} people={people} measure={measure} />}
      />
      {desk.conflict && (
        <ConflictDialog
          conflict={desk.conflict}
          classes={classes}
          isSaving={desk.isBusy}
          onKeepMine={() => desk.conflict && void desk.keepMine(desk.conflict)}
          onTakeTheirs={() => desk.conflict && desk.takeTheirs(desk.conflict)}
          onClose={desk.closeConflict}
        />
      )}
      {desk.isKeyListOpen && <KeyList onClose={() => desk.setIsKeyListOpen(false)} />}
    </>
  );
}
