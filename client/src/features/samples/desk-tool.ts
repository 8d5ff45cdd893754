import type { DrawTool } from '../../components/map/drawing-modes.ts';

export type DeskTool = 'select' | 'inspect' | 'grow' | DrawTool;

/** The tool when it draws by hand, else null. */
export function drawToolOf(tool: DeskTool): DrawTool | null {
  return tool === 'select' || tool === 'inspect' || tool === 'grow' ? null : tool;
}

export const DESK_TOOLS: readonly { tool: DeskTool; label: string; key: string; draws: boolean }[] = [
  { tool: 'polygon', label: 'Polygon', key: 'P', draws: true },
  { tool: 'freehand', label: 'Freehand', key: 'F', draws: true },
  { tool: 'rectangle', label: 'Rectangle', key: 'R', draws: true },
  { tool: 'circle', label: 'Circle', key: 'C', draws: true },
  { tool: 'grow', label: 'Grow', key: 'G', draws: true },
  { tool: 'select', label: 'Select', key: 'V', draws: false },
  { tool: 'inspect', label: 'Inspect pixel', key: 'I', draws: false },
];
