import { classPaletteStep } from '../../../../shared/constants/class-palette.ts';

export interface FieldPatch {
  /** SVG path of the patch in the plate's units. */
  d: string;
  colour: string;
}

const HORIZON_Y = 640;
const GROUND_Y = 1010;
const N_ROWS = 11;
const N_COLUMNS = 30;
const WIDTH = 2900;
/** Palette positions, by how often land like that turns up: pasture and arable more than rock or brick. */
const COVER = [6, 6, 6, 7, 7, 3, 3, 6, 7, 1, 2, 5, 4, 8, 6, 7];

/** A land of fields seen from above, narrowing to a horizon: the same one every time. */
export function buildFieldPatchwork(): FieldPatch[] {
  const random = seededRandom(20250904);
  const corners = Array.from({ length: N_ROWS + 1 }, (_, row) => {
    const depth = row / N_ROWS;
    const y = HORIZON_Y + (GROUND_Y - HORIZON_Y) * depth ** 1.7;
    const spread = 0.55 + 0.75 * depth;
    return Array.from({ length: N_COLUMNS + 1 }, (_, column) => {
      const x = 400 + (column / N_COLUMNS - 0.5) * WIDTH * spread;
      const jitter = 8 + 34 * depth;
      const hill = 26 * Math.sin(x / 190 + 0.7) * (1 - depth) + 8 * Math.sin(x / 61);
      return { x: x + (random() - 0.5) * jitter * 1.6, y: y - hill + (random() - 0.5) * jitter * 0.5 };
    });
  });
  const patches: FieldPatch[] = [];
  for (let row = 0; row < N_ROWS; row++) {
    for (let column = 0; column < N_COLUMNS; column++) {
      const ring = [
        corners[row]![column]!,
        corners[row]![column + 1]!,
        corners[row + 1]![column + 1]!,
        corners[row + 1]![column]!,
      ];
      for (const part of cutField(ring, random)) {
        const cover = COVER[Math.floor(random() * COVER.length)]!;
        patches.push({ d: pathOf(part), colour: classPaletteStep(cover).colour });
      }
    }
  }
  return patches;
}

interface Corner {
  x: number;
  y: number;
}

/** Some fields are cut in two, up and down or across, never quite in the middle. */
function cutField(ring: Corner[], random: () => number): Corner[][] {
  const [a, b, c, d] = ring as [Corner, Corner, Corner, Corner];
  const chance = random();
  const share = 0.3 + 0.4 * random();
  if (chance < 0.22) {
    const [top, foot] = [between(a, b, share), between(d, c, 1 - share)];
    return [
      [a, top, foot, d],
      [top, b, c, foot],
    ];
  }
  if (chance < 0.36) {
    const [left, right] = [between(a, d, share), between(b, c, 1 - share)];
    return [
      [a, b, right, left],
      [left, right, c, d],
    ];
  }
  return [ring];
}

function between(from: Corner, to: Corner, share: number): Corner {
  return { x: from.x + (to.x - from.x) * share, y: from.y + (to.y - from.y) * share };
}

function pathOf(ring: Corner[]): string {
  return `M${ring.map(({ x, y }) => `${x.toFixed(1)} ${y.toFixed(1)}`).join('L')}Z`;
}

/** mulberry32: small, even enough for a drawing. Numbers in [0, 1). */
function seededRandom(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state + 0x6d2b79f5) | 0;
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state);
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed;
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4294967296;
  };
}
