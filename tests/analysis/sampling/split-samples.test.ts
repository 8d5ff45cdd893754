import { describe, expect, it } from 'vitest';
import { drawTrainingPixels } from '../../../server/analysis/sampling/draw-training-pixels.ts';
import { dropPixelsNear } from '../../../server/analysis/sampling/drop-pixels-near.ts';
import { createRng } from '../../../server/analysis/sampling/rng.ts';
import { splitSamples, type SplitCandidate } from '../../../server/analysis/sampling/split-samples.ts';

function polygons(counts: Record<string, number>): SplitCandidate[] {
  return Object.entries(counts).flatMap(([classId, n]) =>
    Array.from({ length: n }, (_, i) => ({ id: `${classId}-${i}`, classId })),
  );
}

describe('holding out samples', () => {
  it('puts every polygon on exactly one side and takes the share within each class', () => {
    const all = polygons({ water: 10, forest: 20, bare: 3 });
    const split = splitSamples(all, 0.3, 42);
    expect([...split.trainingIds, ...split.heldOutIds].sort()).toEqual(all.map(({ id }) => id).sort());
    const heldOut = (name: string) => split.heldOutIds.filter((id) => id.startsWith(name)).length;
    expect([heldOut('water'), heldOut('forest'), heldOut('bare')]).toEqual([3, 6, 1]);
  });

  it('does not depend on the order the polygons come in', () => {
    const all = polygons({ water: 9, forest: 14 });
    const wanted = splitSamples(all, 0.3, 7);
    for (let seed = 0; seed < 10; seed++) {
      expect(splitSamples(createRng(seed).shuffle([...all]), 0.3, 7)).toEqual(wanted);
    }
  });

  it('changes with the seed, and not with other classes', () => {
    const water = polygons({ water: 20 });
    const both = [...water, ...polygons({ forest: 5 })];
    const pick = (seed: number) => splitSamples(water, 0.5, seed).heldOutIds.join();
    expect(pick(1)).not.toBe(pick(2));
    expect(splitSamples(both, 0.5, 1).heldOutIds.filter((id) => id.startsWith('water')).join()).toBe(pick(1)); // prettier-ignore
  });

  it('leaves at least one polygon on each side and names classes that cannot be checked', () => {
    for (const share of [0.01, 0.99]) {
      const split = splitSamples(polygons({ pair: 2, lone: 1 }), share, 3);
      expect(split.heldOutIds).toHaveLength(1);
      expect(split.heldOutIds[0]).toMatch(/^pair/);
      expect(split.trainingIds).toContain('lone-0');
      expect(split.classesWithoutHeldOut).toEqual(['lone']);
    }
  });

  it('holds each polygon out about equally often over many seeds', () => {
    const counts = new Map<string, number>();
    for (let seed = 0; seed < 2000; seed++) {
      for (const id of splitSamples(polygons({ a: 10 }), 0.3, seed).heldOutIds)
        counts.set(id, (counts.get(id) ?? 0) + 1);
    }
    expect(counts.size).toBe(10);
    for (const count of counts.values()) expect(Math.abs(count - 600)).toBeLessThan(100);
  });

  it('refuses a share outside the open interval and an id that comes twice', () => {
    expect(() => splitSamples(polygons({ a: 3 }), 1, 0)).toThrow(RangeError);
    expect(() => splitSamples([...polygons({ a: 3 }), ...polygons({ a: 1 })], 0.3, 0)).toThrow(/twice/);
  });

  it('shows the leak a split by pixel has: 12 of 12 right by pixel, 0 of 12 by polygon (worked by hand)', () => {
    const pixels = [
      { polygon: 'A1', label: 'A', values: [10.0, 10.1, 10.2] },
      { polygon: 'B2', label: 'B', values: [11.0, 11.1, 11.2] },
      { polygon: 'B1', label: 'B', values: [20.0, 20.1, 20.2] },
      { polygon: 'A2', label: 'A', values: [21.0, 21.1, 21.2] },
    ].flatMap(({ polygon, label, values }) => values.map((value) => ({ polygon, label, value })));
    const nRight = (mayUse: (a: { polygon: string }, b: { polygon: string }) => boolean) =>
      pixels.filter((one) => {
        const others = pixels.filter((other) => other !== one && mayUse(one, other));
        others.sort((a, b) => Math.abs(a.value - one.value) - Math.abs(b.value - one.value));
        return others[0].label === one.label;
      }).length;
    expect(nRight(() => true)).toBe(12);
    expect(nRight((a, b) => a.polygon !== b.polygon)).toBe(0);
    // So the split must never put pixels of one polygon on both sides.
    const split = splitSamples(['A1', 'A2', 'B1', 'B2'].map((id) => ({ id, classId: id[0] })), 0.5, 1); // prettier-ignore
    expect(split.trainingIds.some((id) => split.heldOutIds.includes(id))).toBe(false);
  });
});

describe('training pixels', () => {
  const range = (from: number, to: number) => Uint32Array.from({ length: to - from }, (_, i) => from + i);

  it('are capped by class, in ascending order, the same for any order of polygons', () => {
    const input = [
      { id: 'a', classIndex: 0, pixels: range(0, 100) },
      { id: 'b', classIndex: 0, pixels: range(200, 300) },
      { id: 'c', classIndex: 1, pixels: range(400, 405) },
    ];
    const drawn = drawTrainingPixels(input, 3, 50, 9);
    expect(drawn.perClass).toEqual([{ available: 200, drawn: 50 }, { available: 5, drawn: 5 }, { available: 0, drawn: 0 }]); // prettier-ignore
    expect([...drawn.pixels]).toEqual([...drawn.pixels].sort((x, y) => x - y));
    expect(drawTrainingPixels([...input].reverse(), 3, 50, 9)).toEqual(drawn);
    expect(drawTrainingPixels(input, 3, 50, 10).pixels).not.toEqual(drawn.pixels);
    drawn.pixels.forEach((pixel, i) => expect(drawn.labels[i]).toBe(pixel >= 400 ? 1 : 0));
  });

  it('count once where polygons of a class overlap and drop out where classes disagree', () => {
    const drawn = drawTrainingPixels(
      [
        { id: 'a', classIndex: 0, pixels: range(0, 10) },
        { id: 'b', classIndex: 0, pixels: range(5, 15) },
        { id: 'c', classIndex: 1, pixels: range(12, 20) },
        { id: 'd', classIndex: 0, pixels: range(12, 13) },
      ],
      2,
      100,
      1,
    );
    expect(drawn.nConflicting).toBe(3);
    expect(drawn.perClass.map(({ drawn: n }) => n)).toEqual([12, 5]);
    expect([...drawn.pixels]).not.toContain(12);
  });

  it('keep their distance from held-out pixels, as by testing every pair', () => {
    const rng = createRng(4);
    const width = 37;
    const draw = (n: number) => Uint32Array.from({ length: n }, () => rng.nextBelow(width * 30));
    for (const distance of [0, 1, 1.5, 2, 4.3]) {
      const [training, heldOut] = [draw(300), draw(20)];
      const wanted = training.filter((p) =>
        heldOut.every((q) => Math.hypot((p % width) - (q % width), Math.floor(p / width) - Math.floor(q / width)) > distance),
      ); // prettier-ignore
      expect(dropPixelsNear(training, heldOut, width, distance)).toEqual(wanted);
      expect(wanted.length).toBeLessThan(300);
    }
  });
});
