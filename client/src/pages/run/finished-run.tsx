import type { Map as LeafletMap } from 'leaflet';
import { useRef, useState } from 'react';
import { Link, useSearchParams } from 'react-router-dom';
import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import type { Run } from '../../../../shared/contracts/run.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { MapPage } from '../../components/layout/map-page.tsx';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { NotFoundState } from '../../components/ui/access-states.tsx';
import { buttonClass } from '../../components/ui/button.tsx';
import { ClassMapStrip } from '../../features/runs/class-map-strip.tsx';
import { ClassMap } from '../../features/runs/class-map.tsx';
import { PixelSlip } from '../../features/runs/pixel-slip.tsx';
import { runTitle } from '../../features/runs/recipe-text.ts';
import { RunSlip } from '../../features/runs/run-slip.tsx';
import { classDigit } from '../../components/layout/class-keys.tsx';
import { SwipeDivider } from '../../components/map/swipe-divider.tsx';
import { useRuns } from '../../features/runs/list-runs.ts';
import { MapClassKeys } from '../../features/runs/map-class-keys.tsx';
import { LAYER_NAMES, type ShownLayer, type SwipeChoice } from '../../features/runs/map-choice.ts';
import { withPositions } from '../../lib/class-positions.ts';
import { formatPercent } from '../../lib/format.ts';
import { useKeys } from '../../lib/keys.ts';
import { paths } from '../../lib/paths.ts';
import type { Place } from '../../lib/project/probe-query.ts';
import { useProject } from '../../lib/project/project-context.ts';
import { useSceneView } from '../../lib/use-scene-view.ts';
import { RunMenu } from './run-menu.tsx';

interface FinishedRunProps {
  run: Run;
  scene: Scene | null;
  scheme: readonly LandClass[];
}

/** The class map over its scene, with its legend, and the pixel that is pressed. */
export function FinishedRun({ run, scene, scheme }: FinishedRunProps) {
  const project = useProject();
  const [view, setView] = useSceneView(project.id);
  const [opacity, setOpacity] = useState(0.8);
  const [place, setPlace] = useState<Place | null>(null);
  const [params] = useSearchParams();
  const [layer, setLayer] = useState<ShownLayer>('classes');
  const [hidden, setHidden] = useState<ReadonlySet<string>>(new Set());
  const [swipe, setSwipe] = useState<SwipeChoice>(params.get('swipe') ?? 'none');
  const [share, setShare] = useState(0.5);
  const runs = useRuns(project.id);
  const others = (runs.data ?? []).filter((one) => one.id !== run.id && one.areas && isAlike(one, run));
  const classes = withPositions(run.classes, scheme);
  const toggle = (id: string) =>
    setHidden((now) => new Set(now.has(id) ? [...now].filter((one) => one !== id) : [...now, id]));
  const map = useRef<LeafletMap>(null);
  const inspectMiddle = () => {
    const middle = map.current?.getCenter().wrap();
    if (middle) setPlace({ lon: middle.lng, lat: middle.lat });
  };
  useKeys({
    h: () => setOpacity((now) => (now > 0 ? 0 : 1)),
    i: inspectMiddle,
    ...Object.fromEntries(
      classes.flatMap(({ id }, index) => {
        const digit = classDigit(index);
        return digit ? [[digit, () => toggle(id)]] : [];
      }),
    ),
    Escape: () => (place ? setPlace(null) : false),
  });
  const { bounds } = scene ?? run;
  return (
    <MapPage
      header={
        <PageHeader
          title={runTitle(run)}
          crumb={[run.name, run.sceneName].filter(Boolean).join(' · ')}
          action={
            <>
              {project.abilities.readAccuracy && (
                <Link to={paths.accuracy(project.id, run.id)} className={buttonClass('primary')}>
                  Read accuracy
                </Link>
              )}
              <RunMenu run={run} />
            </>
          }
        >
          <Link to={paths.runs(project.id)} className="link text-sm">
            All runs
          </Link>
        </PageHeader>
      }
      map={
        scene && bounds ? (
          <>
            <ClassMap
              run={run}
              scene={{ ...scene, bounds }}
              view={view}
              opacity={opacity}
              layer={layer}
              hiddenCodes={run.classes.filter(({ id }) => hidden.has(id)).map(({ code }) => code)}
              swipe={swipe}
              share={share}
              studyArea={project.studyArea}
              place={place}
              onPress={setPlace}
              onReady={(ready) => {
                map.current = ready;
              }}
            />
            {swipe !== 'none' && (
              <SwipeDivider
                share={share}
                onChange={setShare}
                leftName={`${runTitle(run)}, ${LAYER_NAMES[layer].toLowerCase()}`}
                rightName={swipe === 'scene' ? scene.name : nameOf(others.find(({ id }) => id === swipe))}
              />
            )}
          </>
        ) : (
          <div className="p-6">
            <NotFoundState title="The scene of this run cannot be shown">
              The figures and downloads at the right still stand.
            </NotFoundState>
          </div>
        )
      }
      strip={
        scene && (
          <ClassMapStrip
            bands={scene.bands}
            view={view}
            onView={setView}
            opacity={opacity}
            onOpacity={setOpacity}
            onInspectMiddle={inspectMiddle}
            layers={run.layers}
            layer={layer}
            onLayer={setLayer}
            swipe={swipe}
            swipeChoices={[
              { value: 'none', label: 'No swipe' },
              { value: 'scene', label: 'Swipe: scene' },
              ...others.map((one) => ({ value: one.id, label: `Swipe: ${runTitle(one)}` })),
            ]}
            onSwipe={setSwipe}
          >
            <MapClassKeys classes={classes} hidden={hidden} onToggle={toggle} onShowAll={() => setHidden(new Set())} />
          </ClassMapStrip>
        )
      }
      slip={
        place && scene ? (
          <PixelSlip run={run} scene={scene} scheme={scheme} place={place} onClose={() => setPlace(null)} />
        ) : (
          <RunSlip
            run={run}
            scene={scene}
            scheme={scheme}
            accuracy={project.abilities.readAccuracy && <AccuracyLine run={run} />}
          />
        )
      }
    />
  );
}

function nameOf(run: Run | undefined): string {
  return run ? [runTitle(run), run.name].filter(Boolean).join(' · ') : 'Other run';
}

/** Whether another run's map lies on the same ground, so that a swipe compares like with like. */
function isAlike(one: Run, other: Run): boolean {
  return JSON.stringify(one.bounds) === JSON.stringify(other.bounds);
}

/** The overall accuracy in a line, never without its interval or the lack of one. */
function AccuracyLine({ run }: { run: Run }) {
  const { overallAccuracy, overallLow, overallHigh } = run;
  return (
    <p className="rounded-r-lg border-l-[3px] border-groundsel bg-groundsel-wash px-3 py-2">
      {overallAccuracy === null ? (
        'Overall accuracy is undefined: no held-out pixel lies in the map.'
      ) : (
        <>
          <span className="font-semibold">{formatPercent(overallAccuracy, 1)}</span> of the held-out pixels carry the
          right class
          {overallLow === null || overallHigh === null
            ? '; too few polygons for an interval.'
            : `, 95 % interval ${formatPercent(overallLow, 1)} to ${formatPercent(overallHigh, 1)}.`}{' '}
          It describes the samples, not the map.
        </>
      )}
    </p>
  );
}
