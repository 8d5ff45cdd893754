import { ChevronUp } from 'lucide-react';
import { type RefObject, useRef, useState } from 'react';
import type { ArealGeometry } from '../../../../shared/contracts/geometry.ts';
import type { Project } from '../../../../shared/contracts/project.ts';
import { Strip, ToolButton, ToolGap } from '../../components/layout/map-page.tsx';
import type { ShapeEditorHandle } from '../../components/map/shape-editor.tsx';
import { Button } from '../../components/ui/button.tsx';
import { Callout } from '../../components/ui/callout.tsx';
import { ConfirmDialog } from '../../components/ui/confirm-dialog.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { Menu, MenuItem } from '../../components/ui/menu.tsx';
import { formatHectares } from '../../lib/format.ts';
import { groundAreaHa } from '../../lib/ground-area.ts';
import { ProblemError, asProblem } from '../../lib/problem-error.ts';
import type { StudyAreaEditor } from './use-study-area-editor.ts';

interface StudyAreaStripProps {
  project: Project;
  editor: StudyAreaEditor;
  shape: RefObject<ShapeEditorHandle | null>;
  onGoTo: (geometry: ArealGeometry) => void;
}

/** The study area at the map's foot: how large it is, and the ways to set it. */
export function StudyAreaStrip({ project, editor, shape, onGoTo }: StudyAreaStripProps) {
  const { tool, draft } = editor;
  return (
    <Strip
      label="Study area"
      tools={
        tool ? (
          <DrawingTools editor={editor} shape={shape} />
        ) : draft ? (
          <DraftTools editor={editor} draft={draft} onGoTo={onGoTo} isFirst={project.studyArea === null} />
        ) : (
          <RestingTools project={project} editor={editor} onGoTo={onGoTo} />
        )
      }
    >
      <StudyAreaTrouble editor={editor} project={project} />
    </Strip>
  );
}

function RestingTools({ project, editor, onGoTo }: Pick<StudyAreaStripProps, 'project' | 'editor' | 'onGoTo'>) {
  const { studyArea, abilities } = project;
  const input = useRef<HTMLInputElement>(null);
  const [isRemoving, setIsRemoving] = useState(false);
  return (
    <>
      <span className="px-2">
        <span className="font-medium">Study area</span>{' '}
        <span className="text-ink-soft">{studyArea ? formatHectares(groundAreaHa(studyArea)) : 'not set'}</span>
      </span>
      {studyArea && <ToolButton label="Go there" onPress={() => onGoTo(studyArea)} />}
      <ToolGap />
      {abilities.manageProject ? (
        <>
          {studyArea ? (
            <>
              <ToolButton
                label="Mend"
                isDisabled={studyArea.type !== 'Polygon' || studyArea.coordinates.length > 1}
                onPress={() => {
                  editor.setDraft(studyArea);
                  onGoTo(studyArea);
                }}
              />
              <Menu
                side="top"
                trigger={
                  <Button kind="ghost" size="sm" className="font-normal! px-2!">
                    Replace <ChevronUp aria-hidden />
                  </Button>
                }
              >
                <MenuItem onSelect={() => editor.draw('polygon')}>Draw an outline</MenuItem>
                <MenuItem onSelect={() => editor.draw('rectangle')}>Draw a rectangle</MenuItem>
                <MenuItem onSelect={() => input.current?.click()}>Choose a GeoJSON file…</MenuItem>
              </Menu>
              <ToolButton label="Remove…" onPress={() => setIsRemoving(true)} />
            </>
          ) : (
            <>
              <ToolButton label="Draw outline" onPress={() => editor.draw('polygon')} />
              <ToolButton label="Rectangle" onPress={() => editor.draw('rectangle')} />
              <ToolButton label="GeoJSON file…" onPress={() => input.current?.click()} />
            </>
          )}
          <input
            ref={input}
            type="file"
            accept=".geojson,.json,application/geo+json,application/json"
            tabIndex={-1}
            aria-hidden
            data-testid="study-area-file"
            className="hidden"
            onChange={(event) => {
              const file = event.target.files?.[0];
              event.target.value = '';
              if (file) void editor.readFile(file).then((geometry) => geometry && onGoTo(geometry));
            }}
          />
        </>
      ) : (
        <span className="px-2 text-ink-soft">The project lead sets it.</span>
      )}
      <ConfirmDialog
        isOpen={isRemoving}
        onOpenChange={setIsRemoving}
        title="Remove the study area?"
        loses={['The outline that limits drawing, mapping and areas']}
        keeps="Samples and finished runs stay as they are. From then on, everything a scene shows is mapped."
        confirmLabel="Remove study area"
        isPending={editor.isSaving}
        error={editor.error ? asProblem(editor.error) : null}
        onConfirm={() => editor.remove(() => setIsRemoving(false))}
      />
    </>
  );
}

function DrawingTools({ editor, shape }: Pick<StudyAreaStripProps, 'editor' | 'shape'>) {
  const isPolygon = editor.tool === 'polygon';
  return (
    <>
      <span className="px-2" role="status">
        <span className="font-medium">{isPolygon ? 'Drawing the study area.' : 'Drawing a rectangle.'}</span>{' '}
        <span className="text-ink-soft">
          {isPolygon ? 'Press the corners; press the first again to close.' : 'Press one corner, then the one across.'}
        </span>
      </span>
      <ToolGap />
      {isPolygon && (
        <>
          <ToolButton label="Undo corner" shortcut="⌃Z" onPress={() => shape.current?.undoCorner()} />
          <ToolButton label="Close" shortcut="⏎" onPress={() => shape.current?.close()} />
        </>
      )}
      <ToolButton label="Cancel" shortcut="Esc" onPress={editor.cancel} />
    </>
  );
}

function DraftTools(
  props: Pick<StudyAreaStripProps, 'editor' | 'onGoTo'> & { draft: ArealGeometry; isFirst: boolean },
) {
  const { editor, draft, isFirst, onGoTo } = props;
  return (
    <>
      <span className="px-2" role="status">
        <span className="font-medium">{isFirst ? 'Study area' : 'New study area'}, not saved:</span>{' '}
        {formatHectares(groundAreaHa(draft))}
        <span className="text-ink-soft">
          {editor.mendable ? '. Drag corners to mend it.' : '. It has several parts or holes and is taken as it is.'}
        </span>
      </span>
      <ToolButton label="Go there" onPress={() => onGoTo(draft)} />
      <ToolGap />
      <ToolButton label="Cancel" shortcut="Esc" onPress={editor.cancel} />
      <Button kind="strong" size="sm" isPending={editor.isSaving} pendingLabel="Saving…" onClick={editor.save}>
        Save study area
      </Button>
    </>
  );
}

function StudyAreaTrouble({ editor, project }: Pick<StudyAreaStripProps, 'editor' | 'project'>) {
  const { refusal, error, draft } = editor;
  if (refusal) {
    return (
      <Callout tone="danger" isAlert title={`${refusal.fileName} is no study area.`} className="m-2">
        Found {refusal.found}. Wanted {refusal.wanted}. {refusal.advice}
      </Callout>
    );
  }
  if (!error || !draft) return null;
  const isStale = error instanceof ProblemError && error.code === 'stale-version';
  return isStale ? (
    <Callout tone="beware" isAlert title="Someone else changed this project meanwhile." className="m-2">
      {project.studyArea
        ? `The study area as it stands now (${formatHectares(groundAreaHa(project.studyArea))}) is dotted on the map, yours is gold.`
        : 'It has no study area as it stands now.'}{' '}
      Save again to put yours in its place, or cancel.
    </Callout>
  ) : (
    <ErrorState error={error} isInline className="m-2" />
  );
}
