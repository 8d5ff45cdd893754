/** Red, green and blue, each 0–255, of a colour written #rrggbb. */
export function readColour(colour: string): [number, number, number] {
  const value = Number.parseInt(colour.slice(1), 16);
  return [value >> 16, (value >> 8) & 255, value & 255];
}
