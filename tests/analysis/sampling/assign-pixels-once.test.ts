import { describe, expect, it } from 'vitest';
import { assignPixelsOnce } from '../../../server/analysis/sampling/assign-pixels-once.ts';

describe('giving each held-out pixel to one polygon', () => {
  it('keeps a pixel of two polygons of one class for the first, and drops one of two classes', () => {
    const { pixels, owners, nRepeated, nConflicting } = assignPixelsOnce([
      { id: 'a', classIndex: 0, pixels: [4, 5, 6] },
      { id: 'b', classIndex: 0, pixels: [6, 7] },
      { id: 'c', classIndex: 1, pixels: [7, 8, 2] },
    ]);
    expect([...pixels]).toEqual([2, 4, 5, 6, 8]);
    expect([...owners]).toEqual([2, 0, 0, 0, 2]);
    expect({ nRepeated, nConflicting }).toEqual({ nRepeated: 1, nConflicting: 1 });
  });

  it('counts a pixel as conflicting when a later polygon of another class claims a repeated one', () => {
    const { pixels, nRepeated, nConflicting } = assignPixelsOnce([
      { id: 'a', classIndex: 0, pixels: [1] },
      { id: 'b', classIndex: 0, pixels: [1] },
      { id: 'c', classIndex: 1, pixels: [1] },
    ]);
    expect([...pixels]).toEqual([]);
    expect({ nRepeated, nConflicting }).toEqual({ nRepeated: 0, nConflicting: 1 });
  });
});
