import type { Coastline } from './coastline.ts';
import type { Drainage } from './drainage.ts';
import { ISLAND_PIXELS, ISLAND_WIDTH as W } from './island-grid.ts';
import type { Relief } from './relief.ts';

interface LochKind {
  count: number;
  depthMeters: number;
  elevation: [low: number, high: number];
  flow: [low: number, high: number];
  nPixels: [low: number, high: number];
  apartPx: number;
}

/** One reservoir in a middle valley, a few small lochs high up. */
const KINDS: LochKind[] = [
  { count: 1, depthMeters: 26, elevation: [70, 230], flow: [2600, 26_000], nPixels: [330, 1300], apartPx: 0 },
  { count: 6, depthMeters: 13, elevation: [150, 420], flow: [250, 4000], nPixels: [26, 160], apartPx: 70 },
];

/** The pixels upstream of a dam that lie below its crest. */
function floodAbove(dam: number, crest: number, drainage: Drainage, elevation: Float32Array, limit: number): number[] {
  const flooded = [dam];
  for (let k = 0; k < flooded.length && flooded.length <= limit; k++) {
    const cell = flooded[k];
    for (const step of [1, -1, W, -W, W + 1, W - 1, -W + 1, -W - 1]) {
      const up = cell + step;
      if (up >= 0 && up < ISLAND_PIXELS && drainage.receiver[up] === cell && elevation[up] < crest) flooded.push(up);
    }
  }
  return flooded;
}

/** Dams valleys to make lochs; returns 1 where there is a loch. */
export function floodLochs(coast: Coastline, relief: Relief, drainage: Drainage, flow: Float32Array): Uint8Array {
  const isLoch = new Uint8Array(ISLAND_PIXELS);
  const dams: number[] = [];
  for (const kind of KINDS) {
    let made = 0;
    for (const dam of drainage.order) {
      if (made === kind.count) break;
      const z = relief.elevation[dam];
      if (z < kind.elevation[0] || z > kind.elevation[1]) continue;
      if (flow[dam] < kind.flow[0] || flow[dam] > kind.flow[1] || coast.inlandPx[dam] < 40) continue;
      const apart = (other: number): number =>
        Math.hypot((dam % W) - (other % W), Math.floor(dam / W) - Math.floor(other / W));
      if (dams.some((other) => apart(other) < kind.apartPx)) continue;
      const flooded = floodAbove(dam, z + kind.depthMeters, drainage, relief.elevation, kind.nPixels[1]);
      if (flooded.length < kind.nPixels[0] || flooded.length > kind.nPixels[1]) continue;
      for (const cell of flooded) isLoch[cell] = 1;
      dams.push(dam);
      made++;
    }
  }
  return isLoch;
}
