import { useEffect, useRef, useState } from 'react';
import { useMap } from 'react-leaflet';
import { useKeys } from '../../lib/keys.ts';
import type { Place } from '../../lib/project/probe-query.ts';

export interface CrosshairProps {
  /** Arrow keys move the crosshair instead of the map. */
  isOn: boolean;
  /** `press` acts at once; `carry` picks up at one Space and drops at the next. */
  action: 'press' | 'carry';
  /** Space was pressed at a place; the pointer events have been sent already. */
  onPress?: (place: Place) => void;
}

interface Point {
  x: number;
  y: number;
}

const STEP_PIXELS = 8;
const LONG_STEP_PIXELS = 48;
/** How near the edge the crosshair may come before the map moves under it. */
const EDGE_PIXELS = 40;

/**
 * A pointer for the keyboard: arrows move it (Shift: farther, Ctrl: one pixel), Space presses. It speaks to the map
 * in pointer events, so that whatever works by mouse works by keys.
 */
export function Crosshair({ isOn, action, onPress }: CrosshairProps) {
  const map = useMap();
  const [point, setPoint] = useState<Point | null>(null);
  const isCarrying = useRef(false);
  const [isHeld, setIsHeld] = useState(false);
  const shown = isOn ? point : null;

  useEffect(() => {
    if (!isOn) return undefined;
    map.keyboard.disable();
    const hide = (event: PointerEvent) => {
      if (event.isTrusted) setPoint(null);
    };
    const container = map.getContainer();
    container.addEventListener('pointermove', hide);
    return () => {
      container.removeEventListener('pointermove', hide);
      map.keyboard.enable();
      isCarrying.current = false;
      setIsHeld(false);
      setPoint(null);
    };
  }, [isOn, map]);

  const move = (dx: number, dy: number) => {
    const size = map.getSize();
    const from = point ?? { x: Math.round(size.x / 2), y: Math.round(size.y / 2) };
    const wanted = point ? { x: from.x + dx, y: from.y + dy } : from;
    const next = {
      x: Math.max(EDGE_PIXELS, Math.min(size.x - EDGE_PIXELS, wanted.x)),
      y: Math.max(EDGE_PIXELS, Math.min(size.y - EDGE_PIXELS, wanted.y)),
    };
    if (next.x !== wanted.x || next.y !== wanted.y) {
      map.panBy([wanted.x - next.x, wanted.y - next.y], { animate: false });
    }
    setPoint(next);
    send(map.getContainer(), 'pointermove', next, -1);
    send(map.getContainer(), 'mousemove', next, -1);
  };
  const press = () => {
    const at = point ?? { x: Math.round(map.getSize().x / 2), y: Math.round(map.getSize().y / 2) };
    if (!point) setPoint(at);
    const container = map.getContainer();
    if (!isCarrying.current) {
      send(container, 'pointermove', at, -1);
      send(container, 'pointerdown', at, 0);
    }
    if (action === 'press' || isCarrying.current) send(container, 'pointerup', at, 0);
    isCarrying.current = action === 'carry' && !isCarrying.current;
    setIsHeld(isCarrying.current);
    const place = map.containerPointToLatLng([at.x, at.y]).wrap();
    onPress?.({ lon: place.lng, lat: place.lat });
  };
  useKeys(
    {
      ...arrowKeys('', STEP_PIXELS, move),
      ...arrowKeys('shift+', LONG_STEP_PIXELS, move),
      ...arrowKeys('mod+', 1, move),
      ' ': (event) => (isOnControl(event) ? false : press()),
    },
    isOn,
  );

  if (!shown) return null;
  return (
    <div
      aria-hidden
      data-held={isHeld || undefined}
      className="crosshair pointer-events-none absolute z-[900]"
      style={{ left: shown.x, top: shown.y }}
    />
  );
}

function arrowKeys(prefix: string, step: number, move: (dx: number, dy: number) => void) {
  const unlessControl = (dx: number, dy: number) => (event: KeyboardEvent) =>
    isOnControl(event) ? false : move(dx, dy);
  return {
    [`${prefix}ArrowLeft`]: unlessControl(-step, 0),
    [`${prefix}ArrowRight`]: unlessControl(step, 0),
    [`${prefix}ArrowUp`]: unlessControl(0, -step),
    [`${prefix}ArrowDown`]: unlessControl(0, step),
  };
}

/** A focused button, row or tab keeps Space, Enter and the arrows for itself. */
export function isOnControl(event: KeyboardEvent): boolean {
  return (
    event.target instanceof Element &&
    event.target.closest('button,a[href],tr[tabindex],[role=radio],[role=tab],[role=slider],[role=combobox]') !== null
  );
}

function send(container: HTMLElement, type: string, { x, y }: Point, button: number): void {
  const { left, top } = container.getBoundingClientRect();
  const place = { clientX: left + x, clientY: top + y, bubbles: true, cancelable: true, button };
  container.dispatchEvent(
    type === 'mousemove'
      ? new MouseEvent(type, { ...place, button: 0 })
      : new PointerEvent(type, { ...place, isPrimary: true, pointerType: 'mouse', pointerId: 1 }),
  );
}
