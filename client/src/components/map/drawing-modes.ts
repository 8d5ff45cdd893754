import {
  type HexColor,
  TerraDrawCircleMode,
  TerraDrawFreehandMode,
  TerraDrawPolygonMode,
  TerraDrawRectangleMode,
  TerraDrawSelectMode,
} from 'terra-draw';

export type DrawTool = 'polygon' | 'freehand' | 'rectangle' | 'circle';

/** Names of keys no keyboard has: the desk's own shortcuts decide when a drawing is closed or left. */
export const CLOSE_KEY = 'GroundselClose';
export const LEAVE_KEY = 'GroundselLeave';

const INK: HexColor = '#1e2a26';
const LIGHT: HexColor = '#fffdf8';
const GOLD: HexColor = '#f2b705';
/** A circle is a polygon of this many corners once drawn; few enough to be mended by hand. */
const CIRCLE_CORNERS = 32;
/** Screen pixels between two corners of a line drawn freehand: fine enough to follow an edge, coarse enough to be mended. */
const FREEHAND_STEP_PIXELS = 12;
/** How near (CSS pixels) a press must be to a corner. */
const REACH_PIXELS = 14;
const keyEvents = { cancel: LEAVE_KEY, finish: CLOSE_KEY };

/** The modes of a shape editor; `colour` is asked at each drawing, so that another class shows at once. */
export function drawingModes(colour: () => string) {
  const fillColor = () => colour() as HexColor;
  const line = { fillColor, fillOpacity: 0.34, outlineColor: GOLD, outlineWidth: 2 };
  const closing = {
    closingPointColor: GOLD,
    closingPointWidth: 6,
    closingPointOutlineColor: INK,
    closingPointOutlineWidth: 2,
  };
  const corners = {
    ...closing,
    coordinatePointColor: LIGHT,
    coordinatePointWidth: 4,
    coordinatePointOutlineColor: INK,
    coordinatePointOutlineWidth: 2,
  };
  return [
    new TerraDrawPolygonMode({
      keyEvents,
      pointerDistance: REACH_PIXELS,
      showCoordinatePoints: true,
      styles: { ...line, ...corners },
    }),
    new TerraDrawFreehandMode({
      keyEvents,
      pointerDistance: REACH_PIXELS,
      drawInteraction: 'click-move-or-drag',
      minDistance: FREEHAND_STEP_PIXELS,
      autoClose: true,
      styles: { ...line, ...closing },
    }),
    new TerraDrawRectangleMode({ keyEvents, drawInteraction: 'click-move-or-drag', styles: line }),
    new TerraDrawCircleMode({
      keyEvents,
      drawInteraction: 'click-move-or-drag',
      segments: CIRCLE_CORNERS,
      styles: line,
    }),
    new TerraDrawSelectMode({
      keyEvents: null,
      pointerDistance: REACH_PIXELS,
      allowManualDeselection: false,
      flags: {
        polygon: { feature: { draggable: true, coordinates: { midpoints: true, draggable: true, deletable: true } } },
      },
      styles: {
        selectedPolygonColor: fillColor,
        selectedPolygonFillOpacity: 0.34,
        selectedPolygonOutlineColor: GOLD,
        selectedPolygonOutlineWidth: 2,
        selectionPointColor: LIGHT,
        selectionPointWidth: 5,
        selectionPointOutlineColor: INK,
        selectionPointOutlineWidth: 2,
        midPointColor: GOLD,
        midPointWidth: 3,
        midPointOutlineColor: INK,
        midPointOutlineWidth: 1,
      },
    }),
  ];
}
