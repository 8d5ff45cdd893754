import L, { type Map as LeafletMap } from 'leaflet';
import { type Ref, useEffect, useImperativeHandle, useRef } from 'react';
import { useMap } from 'react-leaflet';
import { TerraDraw, TerraDrawModeUndoRedo } from 'terra-draw';
import { TerraDrawLeafletAdapter } from 'terra-draw-leaflet-adapter';
import type { Polygon } from '../../../../shared/contracts/geometry.ts';
import { CLOSE_KEY, type DrawTool, LEAVE_KEY, drawingModes } from './drawing-modes.ts';
import { roundPolygon } from './round-polygon.ts';

export interface ShapeEditorHandle {
  /** True while a drawing has begun and is not closed. */
  isDrawing: () => boolean;
  /** Takes back the last corner of a drawing under way; false when there is none. */
  undoCorner: () => boolean;
  redoCorner: () => boolean;
  /** Closes the polygon under way. */
  close: () => void;
  /** Leaves the drawing under way. */
  leave: () => void;
}

export interface ShapeEditorProps {
  /** What the next drawing is; null draws nothing. */
  tool: DrawTool | null;
  /** The outline open for mending; nothing new is drawn meanwhile. */
  shape: Polygon | null;
  /** Class colour, #rrggbb. */
  colour: string;
  onDrawn: (shape: Polygon) => void;
  onShaped: (shape: Polygon) => void;
  /** Corners of a drawing under way can be taken back, or set again. */
  onCorners?: (corners: { canUndo: boolean; canRedo: boolean }) => void;
  /** The outline cannot be opened for mending, and why ("Feature has holes"). */
  onUnmendable: (reason: string) => void;
  ref?: Ref<ShapeEditorHandle>;
}

const SHAPE_ID = '00000000-0000-4000-8000-000000000001';

/** Draws one polygon, rectangle or circle by pointer, or mends one outline: drag corners, midpoints or the whole. */
export function ShapeEditor(props: ShapeEditorProps) {
  const { tool, shape, colour, onDrawn, onShaped, onCorners, onUnmendable, ref } = props;
  const map = useMap();
  const draw = useRef<TerraDraw>(undefined);
  const latest = useRef({ colour, onDrawn, onShaped, onCorners, onUnmendable });
  /** The outline the editor holds, as this component's parent knows it. */
  const held = useRef<string | null>(null);
  useEffect(() => {
    latest.current = { colour, onDrawn, onShaped, onCorners, onUnmendable };
  });

  useEffect(() => {
    const editor = new TerraDraw({
      adapter: new TerraDrawLeafletAdapter({ lib: L, map, minPixelDragDistanceSelecting: 3 }),
      modes: drawingModes(() => latest.current.colour),
      undoRedo: { modeLevel: new TerraDrawModeUndoRedo() },
    });
    editor.start();
    draw.current = editor;
    held.current = null;
    editor.on('finish', (id, { action }) => {
      const geometry = editor.getSnapshotFeature(id)?.geometry;
      if (geometry?.type !== 'Polygon') return;
      const drawn = roundPolygon(geometry.coordinates);
      if (action === 'draw') {
        latest.current.onDrawn(drawn);
        return;
      }
      held.current = JSON.stringify(drawn);
      latest.current.onShaped(drawn);
    });
    const tellCorners = () => latest.current.onCorners?.({ canUndo: editor.canUndo(), canRedo: editor.canRedo() });
    editor.on('history', tellCorners);
    editor.on('finish', tellCorners);
    // Midpoints are set at the screen's precision: at another zoom they would lie beside the outline.
    const reopen = () => {
      if (editor.getMode() !== 'select' || !editor.hasFeature(SHAPE_ID)) return;
      editor.deselectFeature(SHAPE_ID);
      editor.selectFeature(SHAPE_ID);
    };
    map.on('zoomend', reopen);
    const underlay = followWithInk(editor, map);
    return () => {
      map.off('zoomend', reopen);
      editor.stop();
      underlay.remove();
      draw.current = undefined;
    };
  }, [map]);

  const shapeKey = shape ? JSON.stringify(shape) : null;
  useEffect(() => {
    const editor = draw.current;
    if (!editor) return;
    if (shapeKey !== null && shapeKey === held.current) return;
    held.current = shapeKey;
    editor.clear();
    latest.current.onCorners?.({ canUndo: false, canRedo: false });
    if (shapeKey === null) {
      editor.setMode(tool ?? 'static');
      return;
    }
    const geometry = roundPolygon((JSON.parse(shapeKey) as Polygon).coordinates);
    const [result] = editor.addFeatures([{ type: 'Feature', id: SHAPE_ID, geometry, properties: { mode: 'polygon' } }]);
    editor.setMode(result?.valid ? 'select' : 'static');
    if (result?.valid) editor.selectFeature(SHAPE_ID);
    else latest.current.onUnmendable(result?.reason ?? 'It could not be read');
  }, [shapeKey, tool, map]);

  useEffect(() => {
    // An option set anew makes the editor ask for its colours again.
    draw.current?.updateModeOptions('select', { pointerDistance: 14 });
  }, [colour]);

  useImperativeHandle(ref, () => {
    const press = (key: string) => map.getContainer().dispatchEvent(new KeyboardEvent('keyup', { key }));
    return {
      isDrawing: () => draw.current?.getModeState() === 'drawing',
      undoCorner: () => draw.current?.undo() ?? false,
      redoCorner: () => draw.current?.redo() ?? false,
      close: () => press(CLOSE_KEY),
      leave: () => press(LEAVE_KEY),
    };
  }, [map]);

  return null;
}

/** A dark line under the gold one, so that the outline is seen on any ground. */
function followWithInk(editor: TerraDraw, map: LeafletMap): { remove: () => void } {
  const ink = L.polygon([], { interactive: false, fill: false, color: '#1e2a26', weight: 5, renderer: L.svg() });
  ink.addTo(map);
  editor.on('change', () => {
    const outline = editor.getSnapshot().find((feature) => feature.geometry.type === 'Polygon');
    const rings = outline?.geometry.type === 'Polygon' ? outline.geometry.coordinates : [];
    ink.setLatLngs(rings.map((ring) => ring.map(([lon = 0, lat = 0]): [number, number] => [lat, lon])));
  });
  return ink;
}
