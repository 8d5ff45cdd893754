import { useState } from 'react';
import type { ArealGeometry, Polygon } from '../../../../shared/contracts/geometry.ts';
import type { Project } from '../../../../shared/contracts/project.ts';
import type { DrawTool } from '../../components/map/drawing-modes.ts';
import { sayDone } from '../../components/ui/toaster.tsx';
import { type StudyAreaRefusal, readStudyArea } from './read-study-area.ts';
import { useSetStudyArea } from './set-study-area.ts';

type AreaTool = Extract<DrawTool, 'polygon' | 'rectangle'>;

export interface StudyAreaEditor {
  /** The tool a new outline is drawn with; null draws nothing. */
  tool: AreaTool | null;
  /** The area not saved yet. */
  draft: ArealGeometry | null;
  /** Corners of it can be dragged: one outline without holes. */
  mendable: Polygon | null;
  /** Why a chosen file is no study area. */
  refusal: (StudyAreaRefusal & { fileName: string }) | null;
  error: Error | null;
  isSaving: boolean;
  draw: (tool: AreaTool) => void;
  setDraft: (draft: ArealGeometry) => void;
  readFile: (file: File) => Promise<ArealGeometry | null>;
  cancel: () => void;
  save: () => void;
  remove: (onRemoved: () => void) => void;
}

/** Far above any study area, and far below what stops a browser. */
const LARGEST_FILE_BYTES = 20_000_000;

/** What is being done to the project's study area: drawn, read from a file, mended, saved, removed. */
export function useStudyAreaEditor(project: Project): StudyAreaEditor {
  const [tool, setTool] = useState<AreaTool | null>(null);
  const [draft, setDraft] = useState<ArealGeometry | null>(null);
  const [refusal, setRefusal] = useState<StudyAreaEditor['refusal']>(null);
  const change = useSetStudyArea(project.id);
  const clear = () => {
    setTool(null);
    setDraft(null);
    setRefusal(null);
    change.reset();
  };
  return {
    tool,
    draft,
    mendable: draft?.type === 'Polygon' && draft.coordinates.length === 1 ? draft : null,
    refusal,
    error: change.error,
    isSaving: change.isPending,
    draw: (next) => {
      clear();
      setTool(next);
    },
    setDraft: (next) => {
      setTool(null);
      setDraft(next);
      change.reset();
    },
    readFile: async (file) => {
      clear();
      const reading = file.size > LARGEST_FILE_BYTES ? tooLarge(file) : readStudyArea(await file.text());
      if (reading.refusal) setRefusal({ ...reading.refusal, fileName: file.name });
      setDraft(reading.geometry);
      return reading.geometry;
    },
    cancel: clear,
    save: () => {
      if (!draft) return;
      change.mutate(
        { geometry: draft, version: project.version },
        {
          onSuccess: () => {
            clear();
            sayDone('Study area saved');
          },
        },
      );
    },
    remove: (onRemoved) =>
      change.mutate(
        { geometry: null, version: project.version },
        {
          onSuccess: () => {
            clear();
            sayDone('Study area removed');
            onRemoved();
          },
        },
      ),
  };
}

function tooLarge(file: File): { geometry: null; refusal: StudyAreaRefusal } {
  return {
    geometry: null,
    refusal: {
      found: `a file of ${Math.round(file.size / 1_000_000)} MB`,
      wanted: 'an outline of at most 20 MB',
      advice: 'Simplify it first, to about the size of a scene pixel.',
    },
  };
}
