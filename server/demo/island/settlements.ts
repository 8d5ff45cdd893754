import type { Coastline } from './coastline.ts';
import { gaussianBlur } from './grid-filters.ts';
import { ISLAND_HEIGHT as H, ISLAND_PIXELS, ISLAND_WIDTH as W } from './island-grid.ts';
import type { Relief } from './relief.ts';
import type { Rivers } from './rivers.ts';
import { seededRng } from './seeded-rng.ts';

/** A town, village or hamlet; position and size in pixels. */
export interface Settlement {
  x: number;
  y: number;
  radiusPx: number;
}

/** Where people live, the town first, and the ground set aside for the airfield and quarries. */
export interface Settlements {
  town: Settlement;
  villages: Settlement[];
  airfield: { x: number; y: number; turn: number };
  quarries: { x: number; y: number }[];
}

const N_VILLAGES = 24;

function distance(a: { x: number; y: number }, b: { x: number; y: number }): number {
  return Math.hypot(a.x - b.x, a.y - b.y);
}

/** Sites the town where the main river can be bridged, and villages on gentle ground well apart. */
export function siteSettlements(coast: Coastline, relief: Relief, rivers: Rivers): Settlements {
  const rng = seededRng(51);
  const gentle = gaussianBlur(relief.slope, W, H, 3);
  const wet = gaussianBlur(rivers.isWater, W, H, 5);
  const bridge = rivers.mainStem[Math.max(0, rivers.mainStem.length - 34)];
  const town: Settlement = { x: (bridge % W) - 9, y: Math.floor(bridge / W) - 4, radiusPx: 37 };

  const candidates: { x: number; y: number; score: number }[] = [];
  for (let k = 0; k < 9000; k++) {
    const x = rng.int(W);
    const y = rng.int(H);
    const luck = rng.next();
    const i = y * W + x;
    if (!coast.isLand[i] || coast.islandPixels[i] < 20_000 || coast.inlandPx[i] < 5) continue;
    if (gentle[i] > 0.11 || relief.elevation[i] > 190 || rivers.isWater[i]) continue;
    const harbour = coast.inlandPx[i] < 14 ? 0.5 * (1 - coast.exposure[i]) : 0;
    candidates.push({ x, y, score: luck + harbour + 2 * Math.min(0.25, wet[i]) - 4 * gentle[i] });
  }
  candidates.sort((a, b) => b.score - a.score);
  const villages: Settlement[] = [];
  for (const c of candidates) {
    if (villages.length === N_VILLAGES) break;
    if (distance(c, town) < 80 || villages.some((v) => distance(c, v) < 72)) continue;
    villages.push({ x: c.x, y: c.y, radiusPx: villages.length < 5 ? rng.range(10, 14) : rng.range(4.5, 8.5) });
  }

  const far = candidates.filter((c) => {
    const from = distance(c, town);
    return from > 75 && from < 190 && coast.inlandPx[c.y * W + c.x] > 30 && villages.every((v) => distance(c, v) > 30);
  });
  const flattest = far.sort((a, b) => gentle[a.y * W + a.x] - gentle[b.y * W + b.x])[0];
  const quarries: { x: number; y: number }[] = [];
  for (let k = 0; k < ISLAND_PIXELS && quarries.length < 3; k++) {
    const q = { x: rng.int(W), y: rng.int(H) };
    const i = q.y * W + q.x;
    const z = relief.elevation[i];
    if (z < 60 || z > 200 || gentle[i] < 0.08 || coast.inlandPx[i] < 25) continue;
    if (quarries.every((other) => distance(q, other) > 220)) quarries.push(q);
  }
  return { town, villages, airfield: { x: flattest.x, y: flattest.y, turn: 0.55 }, quarries };
}
