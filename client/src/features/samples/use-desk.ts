import { type RefObject, useMemo, useState } from 'react';
import { useSearchParams } from 'react-router-dom';
import type { Polygon } from '../../../../shared/contracts/geometry.ts';
import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import type { Project } from '../../../../shared/contracts/project.ts';
import {
  type Confidence,
  type Sample,
  type SampleVersion,
  sampleStateSchema,
} from '../../../../shared/contracts/sample.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import type { ShapeEditorHandle } from '../../components/map/shape-editor.tsx';
import type { ZoomTarget } from '../../components/map/zoom-to.tsx';
import type { Place } from '../../lib/project/probe-query.ts';
import type { DeskTool } from './desk-tool.ts';
import { type Draft, draftOfSample, isSameOutline, newDraft } from './draft.ts';
import { useGrow } from './grow-from-pixel.ts';
import { polygonBounds } from './polygon-bounds.ts';
import { NO_FILTER, type SampleFilter, filterSamples } from './sample-filter.ts';
import { useDeskActs } from './use-desk-acts.ts';
import { useStoredDraft } from './use-stored-draft.ts';

export interface DeskInput {
  project: Project;
  viewerId: string;
  scenes: readonly Scene[];
  classes: readonly LandClass[];
  samples: readonly Sample[];
  /** Where the desk opens when no link or drawing says otherwise. */
  firstPlace: Polygon | null;
  /** The map's editor, for leaving a drawing under way. */
  editor: RefObject<ShapeEditorHandle | null>;
}

/** All that is open on the sampling desk, and what can be done with it. */
export function useDesk({ project, viewerId, scenes, classes, samples, firstPlace, editor }: DeskInput) {
  const [search, setSearch] = useSearchParams();
  const canDraw = project.abilities.drawSamples;
  const { draft, setDraft, isFromBefore } = useStoredDraft(
    project.id,
    viewerId,
    ({ sceneId, classId }) =>
      canDraw && scenes.some(({ id }) => id === sceneId) && classes.some(({ id }) => id === classId),
  );
  const [linkedIds] = useState(() => (search.get('sample') ?? search.get('samples'))?.split(',') ?? []);
  const [sceneId, setSceneId] = useState(
    draft?.sceneId ?? samples.find(({ id }) => id === linkedIds[0])?.sceneId ?? scenes[0]!.id,
  );
  const [tool, setTool] = useState<DeskTool>('select');
  const [classId, setClassId] = useState(draft?.classId ?? classes[0]!.id);
  const [confidence, setConfidence] = useState<Confidence>('medium');
  const [probe, setProbe] = useState<Place | null>(null);
  const [filter, setFilter] = useState(() => filterOfLink(search));
  const [isListOpen, setIsListOpen] = useState(() => search.has('state'));
  const [isKeyListOpen, setIsKeyListOpen] = useState(false);
  const [version, setVersion] = useState<SampleVersion | null>(null);
  const [corners, setCorners] = useState({ canUndo: false, canRedo: false });
  const [zoom, setZoom] = useState<ZoomTarget | null>(() => {
    const places = draft
      ? [draft.geometry]
      : samples.filter(({ id }) => linkedIds.includes(id)).map(({ geometry }) => geometry);
    return zoomTarget(places.length === 0 && firstPlace ? [firstPlace] : places, 'fit');
  });

  const byId = useMemo(() => new Map(classes.map((one) => [one.id, one])), [classes]);
  const sceneSamples = useMemo(() => samples.filter((one) => one.sceneId === sceneId), [samples, sceneId]);
  const shown = useMemo(() => filterSamples(sceneSamples, filter, byId), [sceneSamples, filter, byId]);
  const selectedId = search.get('sample') ?? onlyOne(search.get('samples'));
  const selected = samples.find(({ id }) => id === selectedId) ?? null;
  const highlighted = search.get('samples');
  const highlightedIds = useMemo(() => highlighted?.split(',') ?? [], [highlighted]);

  const select = (id: string | null) => {
    setVersion(null);
    setProbe(null);
    setSearch(
      (before) => {
        const next = new URLSearchParams(before);
        if (id) next.set('sample', id);
        else if (next.has('sample')) next.delete('sample');
        else next.delete('samples');
        return next;
      },
      { replace: true },
    );
  };
  const growing = useGrow(project.id, sceneId);
  const acts = useDeskActs({ projectId: project.id, draft, setDraft, onSelect: select });
  const openDraft = (next: Draft) => {
    setProbe(null);
    setVersion(null);
    setDraft(next);
  };
  const showPlace = (geometry: Polygon) => setZoom(zoomTarget([geometry], 'show'));

  const beginDrawing = (shape: Polygon): Draft => {
    const next = newDraft(sceneId, classId, shape, confidence);
    openDraft(next);
    acts.noteDrawn(next);
    showPlace(shape);
    return next;
  };
  const reshape = (shape: Polygon) => {
    if (!draft || isSameOutline(draft.geometry, shape)) return;
    acts.noteShaped(draft.geometry, shape);
    acts.clearError();
    setDraft({ ...draft, geometry: shape });
  };

  return {
    ...acts,
    project,
    canUndo: corners.canUndo || acts.canUndo,
    canRedo: corners.canRedo || acts.canRedo,
    undo: () => {
      if (!editor.current?.undoCorner()) acts.undo();
    },
    redo: () => {
      if (!editor.current?.redoCorner()) acts.redo();
    },
    canDraw,
    scene: scenes.find(({ id }) => id === sceneId) ?? scenes[0]!,
    classes,
    byId,
    tool,
    classId: draft?.classId ?? classId,
    draft,
    isFromBefore,
    selected: draft ? null : selected,
    highlightedIds,
    marked: samples.filter(({ id }) => highlightedIds.includes(id)),
    probe,
    version,
    zoom,
    filter,
    shown,
    sceneSamples,
    isListOpen,
    isKeyListOpen,
    select,
    setCorners,
    setFilter,
    setIsListOpen: (isOpen: boolean) => {
      setIsListOpen(isOpen);
      // The map grows or shrinks from its left: what is open on it stays in sight.
      const open = draft?.geometry ?? selected?.geometry;
      if (open) showPlace(open);
    },
    setIsKeyListOpen,
    setProbe,
    setVersion: (next: SampleVersion | null) => {
      setVersion(next);
      if (next) showPlace(next.geometry);
    },
    chooseScene: (id: string) => {
      if (draft) return;
      select(null);
      setSceneId(id);
    },
    chooseTool: (next: DeskTool) => {
      editor.current?.leave();
      setTool(next);
      if (next !== 'inspect') setProbe(null);
    },
    chooseClass: (id: string) => {
      setClassId(id);
      if (draft) setDraft({ ...draft, classId: id });
    },
    changeDraft: (next: Draft) => {
      setClassId(next.classId);
      if (draft && next.confidence !== draft.confidence) setConfidence(next.confidence);
      acts.clearError();
      setDraft(next);
    },
    drawn: (shape: Polygon) => {
      growing.setGrown(null);
      beginDrawing(shape);
    },
    shaped: (shape: Polygon) => {
      // An outline mended by hand is no longer what grew.
      growing.setGrown(null);
      reshape(shape);
    },
    growDistance: growing.distance,
    isGrowing: growing.isGrowing,
    /** The drawing in hand was grown and its distance may be changed. */
    isGrown: draft !== null && growing.grown?.draftId === draft.id,
    growFrom: (place: Place) => {
      if (draft) return;
      growing.grow(place, growing.distance, (shape) => growing.setGrown({ draftId: beginDrawing(shape).id, place }));
    },
    growAgain: (distance: number) => {
      if (growing.grown) growing.grow(growing.grown.place, distance, reshape);
    },
    edit: (sample: Sample) => {
      openDraft(draftOfSample(sample));
      setClassId(sample.classId);
      showPlace(sample.geometry);
    },
    goToPlace: (geometry: Polygon) => setZoom(zoomTarget([geometry], 'fit')),
    goTo: (sample: Sample) => {
      if (draft) return;
      select(sample.id);
      setZoom(zoomTarget([sample.geometry], 'fit'));
    },
  };
}

export type Desk = ReturnType<typeof useDesk>;

/** A link from a letter or the overview may show samples of one state: `?state=returned`. */
function filterOfLink(search: URLSearchParams): SampleFilter {
  const state = sampleStateSchema.safeParse(search.get('state'));
  return state.success ? { ...NO_FILTER, state: state.data } : NO_FILTER;
}

/** The id of a list that names one sample: it is selected, not only marked. */
function onlyOne(ids: string | null): string | null {
  return ids && !ids.includes(',') ? ids : null;
}

let turns = 0;
function zoomTarget(outlines: readonly Polygon[], kind: ZoomTarget['kind']): ZoomTarget | null {
  const bounds = polygonBounds(outlines);
  turns += 1;
  return bounds && { bounds, kind, turn: turns };
}
