import { Contrast, Square, SquareDashed, ZoomIn, ZoomOut } from 'lucide-react';
import { IconButton } from '../ui/icon-button.tsx';
import { CLOSEST, FARTHEST } from './context-choice.ts';
import type { ContextState } from './use-context-views.ts';
import { ViewPicker } from './view-picker.tsx';

/** How the pictures of a place are shown: how close, with outlines or not, in which colours, and which of them. */
export function PlaceTools({ context }: { context: ContextState }) {
  const { zoomSteps, hasOutlines, isLocal } = context;
  return (
    <div role="group" aria-label="Pictures" className="flex items-center gap-1">
      <IconButton
        label="Farther"
        shortcut="−"
        size="sm"
        icon={<ZoomOut aria-hidden />}
        disabled={zoomSteps <= FARTHEST}
        onClick={context.farther}
      />
      <IconButton
        label="Closer"
        shortcut="+"
        size="sm"
        icon={<ZoomIn aria-hidden />}
        disabled={zoomSteps >= CLOSEST}
        onClick={context.closer}
      />
      <IconButton
        label="Outlines of the pixel, 3 × 3 and 5 × 5"
        shortcut="O"
        size="sm"
        icon={hasOutlines ? <Square aria-hidden /> : <SquareDashed aria-hidden />}
        isOn={hasOutlines}
        onClick={context.toggleOutlines}
      />
      <IconButton
        label="Colours stretched to what is around"
        shortcut="L"
        size="sm"
        icon={<Contrast aria-hidden />}
        isOn={isLocal}
        onClick={context.toggleLocal}
      />
      <ViewPicker views={context.views} hidden={context.hidden} onChange={context.hide} />
    </div>
  );
}
