import type { Page } from 'playwright-core';

/** Pixels of a Web Mercator world at zoom 0 (OGC Two Dimensional Tile Matrix Set, WebMercatorQuad). */
const TILE_PIXELS = 256;

function toWorld(lon: number, lat: number, zoom: number): [x: number, y: number] {
  const size = TILE_PIXELS * 2 ** zoom;
  const latitude = (lat * Math.PI) / 180;
  return [((lon + 180) / 360) * size, (size / 2) * (1 - Math.log(Math.tan(Math.PI / 4 + latitude / 2)) / Math.PI)];
}

/**
 * Where a longitude and latitude lie on the screen, read off a drawn map tile: its address says which part of the world it is,
 * its box where that is on the screen.
 */
export async function findOnScreen(page: Page, lon: number, lat: number): Promise<{ x: number; y: number }> {
  const tile = page.locator('img.leaflet-tile-loaded[src*="/tiles/"]').first();
  const [source, box] = [await tile.getAttribute('src'), await tile.boundingBox()];
  const address = /\/tiles\/(\d+)\/(\d+)\/(\d+)\.webp/.exec(source ?? '');
  if (!address || !box) throw new Error(`no map tile is drawn: ${source}`);
  const [zoom, column, row] = address.slice(1).map(Number) as [number, number, number];
  const [x, y] = toWorld(lon, lat, zoom);
  const scale = box.width / TILE_PIXELS;
  return { x: box.x + (x - column * TILE_PIXELS) * scale, y: box.y + (y - row * TILE_PIXELS) * scale };
}
