import type { SampleListRow } from './samples-list.ts';

/** Squares a side of the grid that says how samples are spread. */
const SQUARES_A_SIDE = 6;

/** In how many squares of a grid over all samples' middles the samples of each class lie, and those of all classes together. */
export function countSquares(byClass: readonly (readonly SampleListRow[])[]): { byClass: number[]; all: number } {
  const middles = byClass.map((samples) => samples.map(middleOf));
  const everywhere = middles.flat();
  const [west, east] = spanOf(everywhere.map(([lon]) => lon));
  const [south, north] = spanOf(everywhere.map(([, lat]) => lat));
  const squareOf = ([lon, lat]: [number, number]) => `${place(lon, west, east)}/${place(lat, south, north)}`;
  return {
    byClass: middles.map((own) => new Set(own.map(squareOf)).size),
    all: new Set(everywhere.map(squareOf)).size,
  };
}

function middleOf({ geometry }: SampleListRow): [number, number] {
  const ring = geometry.coordinates[0] ?? [];
  const [west, east] = spanOf(ring.map(([lon]) => lon));
  const [south, north] = spanOf(ring.map(([, lat]) => lat));
  return [(west + east) / 2, (south + north) / 2];
}

function spanOf(values: readonly number[]): [number, number] {
  return values.reduce(([low, high], value) => [Math.min(low, value), Math.max(high, value)], [Infinity, -Infinity]);
}

function place(value: number, from: number, to: number): number {
  return to > from ? Math.min(SQUARES_A_SIDE - 1, Math.floor(((value - from) / (to - from)) * SQUARES_A_SIDE)) : 0;
}
