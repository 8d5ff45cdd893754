import { ISLAND_HEIGHT as H, ISLAND_WIDTH as W } from './island-grid.ts';

/**
 * Raises `coverage` to the share of each pixel a straight stroke covers; ends in pixel coordinates,
 * pixel centres at whole numbers, width in pixels.
 */
export function drawStroke(
  coverage: Float32Array,
  x0: number,
  y0: number,
  x1: number,
  y1: number,
  widthPx: number,
): void {
  const reach = widthPx / 2 + 1;
  const dx = x1 - x0;
  const dy = y1 - y0;
  const squared = dx * dx + dy * dy;
  const strength = Math.min(1, widthPx);
  const left = Math.max(0, Math.floor(Math.min(x0, x1) - reach));
  const right = Math.min(W - 1, Math.ceil(Math.max(x0, x1) + reach));
  const top = Math.max(0, Math.floor(Math.min(y0, y1) - reach));
  const bottom = Math.min(H - 1, Math.ceil(Math.max(y0, y1) + reach));
  for (let y = top; y <= bottom; y++) {
    for (let x = left; x <= right; x++) {
      const t = squared > 0 ? Math.min(1, Math.max(0, ((x - x0) * dx + (y - y0) * dy) / squared)) : 0;
      const away = Math.hypot(x - x0 - t * dx, y - y0 - t * dy);
      const share = Math.min(1, Math.max(0, Math.max(widthPx, 1) / 2 + 0.5 - away)) * strength;
      const i = y * W + x;
      if (share > coverage[i]) coverage[i] = share;
    }
  }
}

/** Calls `visit` for a 4-connected run of pixels from one end of a straight line to the other. */
export function walkLine(x0: number, y0: number, x1: number, y1: number, visit: (pixel: number) => void): void {
  let x = Math.round(x0);
  let y = Math.round(y0);
  const endX = Math.round(x1);
  const endY = Math.round(y1);
  const dx = Math.abs(endX - x);
  const dy = Math.abs(endY - y);
  const sx = endX > x ? 1 : -1;
  const sy = endY > y ? 1 : -1;
  let goneX = 0;
  let goneY = 0;
  visit(y * W + x);
  while (goneX < dx || goneY < dy) {
    if ((0.5 + goneX) * dy < (0.5 + goneY) * dx) {
      x += sx;
      goneX++;
    } else {
      y += sy;
      goneY++;
    }
    visit(y * W + x);
  }
}
