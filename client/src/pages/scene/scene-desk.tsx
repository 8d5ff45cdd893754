import { MoreHorizontal, Table2, Trash2 } from 'lucide-react';
import { useRef, useState } from 'react';
import { Link, useNavigate, useSearchParams } from 'react-router-dom';
import type { ArealGeometry } from '../../../../shared/contracts/geometry.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { MapPage } from '../../components/layout/map-page.tsx';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { CompositeControl } from '../../components/map/composite-control.tsx';
import { SceneChoice } from '../../components/map/scene-choice.tsx';
import type { ShapeEditorHandle } from '../../components/map/shape-editor.tsx';
import { StretchControl } from '../../components/map/stretch-control.tsx';
import type { ZoomTarget } from '../../components/map/zoom-to.tsx';
import { Button, buttonClass } from '../../components/ui/button.tsx';
import { Menu, MenuItem } from '../../components/ui/menu.tsx';
import { areaBounds } from '../../features/scenes/area-bounds.ts';
import { DeleteSceneDialog } from '../../features/scenes/delete-scene-dialog.tsx';
import { SceneMap } from '../../features/scenes/scene-map.tsx';
import { type SceneLeaf, SceneSlip } from '../../features/scenes/scene-slip.tsx';
import { StudyAreaStrip } from '../../features/scenes/study-area-strip.tsx';
import { useBandLimits } from '../../features/scenes/use-band-limits.ts';
import { useStudyAreaEditor } from '../../features/scenes/use-study-area-editor.ts';
import { useKeys } from '../../lib/keys.ts';
import { paths } from '../../lib/paths.ts';
import type { Place } from '../../lib/project/probe-query.ts';
import { useProject } from '../../lib/project/project-context.ts';
import type { SceneView } from '../../lib/scene-view.ts';
import { useSceneView } from '../../lib/use-scene-view.ts';

interface SceneDeskProps {
  scene: Scene;
  /** The ready scenes of the project. */
  scenes: readonly Scene[];
}

/** A ready scene: map, composites and stretch, pixel probe, study area. */
export function SceneDesk({ scene, scenes }: SceneDeskProps) {
  const project = useProject();
  const navigate = useNavigate();
  const [search] = useSearchParams();
  const [view, setView] = useSceneView(project.id);
  const [limits, setLimits] = useBandLimits(scene.id);
  const [place, setPlace] = useState<Place | null>(null);
  const [leaf, setLeaf] = useState<SceneLeaf>('about');
  const [isFootprintShown, setIsFootprintShown] = useState(false);
  const [isDeleting, setIsDeleting] = useState(false);
  const area = useStudyAreaEditor(project);
  const shape = useRef<ShapeEditorHandle>(null);
  const [zoom, setZoom] = useState<ZoomTarget | null>(() =>
    search.has('study-area') && project.studyArea
      ? { bounds: areaBounds(project.studyArea), kind: 'fit', turn: 0 }
      : null,
  );
  const goTo = (geometry: ArealGeometry) =>
    setZoom({ bounds: areaBounds(geometry), kind: 'fit', turn: (zoom?.turn ?? 0) + 1 });
  // A stretch by percentiles takes the place of limits set by hand.
  const changeStretch = (stretch: SceneView['stretch']) => {
    setView({ ...view, stretch });
    setLimits({});
  };
  const probe = (at: Place) => {
    setPlace(at);
    setLeaf('pixel');
  };
  useKeys({
    Enter: () => (area.tool && shape.current?.isDrawing() ? shape.current.close() : false),
    'mod+z': () => (area.tool ? shape.current?.undoCorner() : false),
    Escape: () => {
      if (area.tool && shape.current?.isDrawing()) shape.current.leave();
      else if (area.tool || area.draft || area.refusal) area.cancel();
      else setPlace(null);
    },
  });
  const canManage = project.abilities.manageScenes;
  return (
    <>
      <MapPage
        header={
          <PageHeader
            title="Scene"
            action={
              <>
                <Link
                  to={paths.sceneBands(project.id, scene.id)}
                  className={buttonClass(scene.guessedRoles && canManage ? 'primary' : 'secondary')}
                >
                  <Table2 aria-hidden />
                  {scene.guessedRoles && canManage ? 'Check band table' : 'Band table'}
                </Link>
                {canManage && (
                  <Menu
                    trigger={
                      <Button kind="ghost" aria-label={`More for ${scene.name}`} className="px-2!">
                        <MoreHorizontal aria-hidden />
                      </Button>
                    }
                  >
                    <MenuItem icon={<Trash2 />} isDanger onSelect={() => setIsDeleting(true)}>
                      Delete scene…
                    </MenuItem>
                  </Menu>
                )}
              </>
            }
          >
            <CompositeControl bands={scene.bands} view={view} onChange={setView} />
            <SceneChoice
              scenes={scenes}
              value={scene.id}
              onChange={(sceneId) => void navigate(paths.scene(project.id, sceneId))}
            />
            <StretchControl stretch={view.stretch} onChange={changeStretch} />
          </PageHeader>
        }
        map={
          <SceneMap
            project={project}
            scene={scene}
            view={view}
            limits={limits}
            place={place}
            onProbe={probe}
            isFootprintShown={isFootprintShown}
            area={area}
            shape={shape}
            zoom={zoom}
          />
        }
        strip={<StudyAreaStrip project={project} editor={area} shape={shape} onGoTo={goTo} />}
        slip={
          <SceneSlip
            scene={scene}
            canManage={canManage}
            leaf={leaf}
            onLeaf={setLeaf}
            place={place}
            view={view}
            limits={limits}
            onLimits={setLimits}
            isFootprintShown={isFootprintShown}
            onFootprint={setIsFootprintShown}
          />
        }
      />
      {isDeleting && (
        <DeleteSceneDialog
          scene={scene}
          onClose={() => setIsDeleting(false)}
          onDeleted={() => void navigate(paths.scenes(project.id), { replace: true })}
        />
      )}
    </>
  );
}
