import type { RefObject } from 'react';
import { classDigit } from '../../components/layout/class-keys.tsx';
import { isOnControl } from '../../components/map/crosshair.tsx';
import type { ShapeEditorHandle } from '../../components/map/shape-editor.tsx';
import { type KeyMap, useKeys } from '../../lib/keys.ts';
import { drawToolOf } from './desk-tool.ts';
import type { Desk } from './use-desk.ts';

/** The desk's shortcuts; KeyList prints them. */
export function useDeskKeys(desk: Desk, editor: RefObject<ShapeEditorHandle | null>, canSave: boolean): void {
  const { draft, selected, canDraw } = desk;
  const isDrawing = () => editor.current?.isDrawing() ?? false;

  const escape = () => {
    if (isDrawing()) editor.current?.leave();
    else if (draft) desk.discard();
    else if (desk.probe) desk.setProbe(null);
    else if (desk.version) desk.setVersion(null);
    else if (desk.selected || desk.highlightedIds.length > 0) desk.select(null);
    else desk.chooseTool('select');
  };
  const enter = (event: KeyboardEvent) => {
    if (isOnControl(event)) return false;
    if (isDrawing()) editor.current?.close();
    else if (draft && canSave) void desk.save(draft);
    else return false;
    return true;
  };
  const erase = () => {
    if (isDrawing()) editor.current?.undoCorner();
    else if (draft?.base === null) desk.discard();
    else if (selected?.abilities.edit) void desk.erase(selected);
  };

  const classKeys: KeyMap = {};
  for (const { id, position } of desk.classes) {
    const digit = classDigit(position);
    if (digit) classKeys[digit] = () => desk.chooseClass(id);
  }
  const drawKeys: KeyMap = {
    p: () => desk.chooseTool('polygon'),
    f: () => desk.chooseTool('freehand'),
    g: () => desk.chooseTool('grow'),
    r: () => desk.chooseTool('rectangle'),
    c: () => desk.chooseTool('circle'),
    e: () => selected?.abilities.edit && desk.edit(selected),
    Enter: enter,
    Delete: erase,
    Backspace: () => editor.current?.undoCorner(),
    'mod+z': desk.undo,
    'mod+shift+z': desk.redo,
    'mod+y': desk.redo,
  };
  useKeys({
    ...classKeys,
    ...(canDraw && drawKeys),
    v: () => desk.chooseTool('select'),
    i: () => desk.chooseTool('inspect'),
    m: () => desk.setIsListOpen(!desk.isListOpen),
    Escape: escape,
    '?': () => desk.setIsKeyListOpen(true),
  });
}

/** What the map's line of help says for the tool in hand; null when there is nothing to add. */
export function toolHelp(desk: Pick<Desk, 'tool' | 'draft' | 'canDraw'>): string | null {
  if (desk.draft)
    return 'Drag corners or the whole outline; the small gold points add corners, a right press takes one out. Enter saves.';
  switch (drawToolOf(desk.tool)) {
    case 'polygon':
      return 'Press for each corner; Enter, or a press on the first corner, closes. Arrow keys and Space do it without a mouse.';
    case 'freehand':
      return 'Press and move along the edge; it closes where it began. Press again, or Enter, closes it earlier.';
    case 'rectangle':
      return 'Press at one corner, then at the one across. Arrow keys and Space do it without a mouse.';
    case 'circle':
      return 'Press in the middle, then at the edge. Arrow keys and Space do it without a mouse.';
    default:
      if (desk.tool === 'grow') {
        return 'Press a pixel: its neighbours of like spectrum become a drawing, and a slider sets how like. Arrow keys and Space do it without a mouse.';
      }
      return desk.tool === 'inspect'
        ? 'Press a pixel for its values in every band; arrow keys and Space do it without a mouse.'
        : null;
  }
}
