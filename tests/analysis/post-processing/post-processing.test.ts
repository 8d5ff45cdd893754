import { execFileSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { labelPatches } from '../../../server/analysis/post-processing/label-patches.ts';
import { filterMajority } from '../../../server/analysis/post-processing/majority-filter.ts';
import { makeRecodeTable, recode } from '../../../server/analysis/post-processing/recode.ts';
import { sieve } from '../../../server/analysis/post-processing/sieve.ts';
import { createRng } from '../../../server/analysis/sampling/rng.ts';

const NODATA = 255;

function read(text: string): { codes: Uint8Array; width: number; height: number } {
  const rows = text
    .trim()
    .split('\n')
    .map((line) => line.trim().split(/\s+/).map(Number));
  return { codes: Uint8Array.from(rows.flat()), width: rows[0]!.length, height: rows.length };
}

function sieveText(text: string, minPixels: number, neighbours: 4 | 8): number[] {
  const { codes, width, height } = read(text);
  const areas = new Float64Array(height).fill(900);
  return [...sieve(codes, width, areas, { minAreaM2: minPixels * 900, neighbours, nodata: NODATA }).codes];
}

/** Checked by hand and with GDAL 3.6.2. */
const GRID_A = `
  1 1 1 1 1 1
  1 2 1 1 3 3
  1 1 2 1 3 3
  1 1 1 1 3 3
  4 4 1 1 1 1
  4 1 1 1 1 5`;

function randomGrid(seed: number, { width = 23, height = 17, classes = 4, nodataShare = 0.1 } = {}) {
  const rng = createRng(seed);
  const codes = Uint8Array.from({ length: width * height }, () =>
    rng.nextFloat() < nodataShare ? NODATA : 1 + Math.floor(rng.nextFloat() * classes),
  );
  return { codes, width, height };
}

describe('majority filter', () => {
  it('keeps the centre on any tie', () => {
    const { codes, width, height } = read(GRID_A);
    const out = filterMajority(codes, width, height, { windowPixels: 3, ties: 'keep-centre', nodata: NODATA });
    const wanted = '1 1 1 1 1 1\n1 1 1 1 1 3\n1 1 1 1 3 3\n1 1 1 1 1 3\n4 1 1 1 1 1\n4 1 1 1 1 1';
    expect([...out]).toEqual([...read(wanted).codes]);
  });

  it('takes the lowest class code on a tie when asked', () => {
    const { codes, width, height } = read(GRID_A);
    const out = filterMajority(codes, width, height, { windowPixels: 3, ties: 'lowest-code', nodata: NODATA });
    const wanted = '1 1 1 1 1 1\n1 1 1 1 1 3\n1 1 1 1 3 3\n1 1 1 1 1 3\n1 1 1 1 1 1\n4 1 1 1 1 1';
    expect([...out]).toEqual([...read(wanted).codes]);
  });

  it.each([1, 2, 3, 4, 5, 6])('agrees with counting every window anew (random grid %i)', (seed) => {
    const { codes, width, height } = randomGrid(seed);
    const windowPixels = [3, 5, 7, 25][seed % 4]!;
    const reach = (windowPixels - 1) / 2;
    const out = filterMajority(codes, width, height, { windowPixels, ties: 'keep-centre', nodata: NODATA });
    codes.forEach((centre, i) => {
      const votes = new Map<number, number>();
      for (let row = 0; row < height; row++) {
        for (let column = 0; column < width; column++) {
          const code = codes[row * width + column]!;
          const isNear = Math.abs(row - Math.floor(i / width)) <= reach && Math.abs(column - (i % width)) <= reach;
          if (isNear && code !== NODATA) votes.set(code, (votes.get(code) ?? 0) + 1);
        }
      }
      const most = Math.max(...votes.values());
      const winners = [...votes].filter(([, n]) => n === most).map(([code]) => code);
      const wanted = centre === NODATA ? NODATA : winners.length > 1 ? centre : winners[0];
      expect(out[i]).toBe(wanted);
    });
  });

  it('refuses a window without a centre', () => {
    expect(() =>
      filterMajority(new Uint8Array(4), 2, 2, { windowPixels: 4, ties: 'keep-centre', nodata: NODATA }),
    ).toThrow(RangeError);
  });
});

describe('sieve', () => {
  it('removes what is smaller than the minimum and keeps what has just the minimum', () => {
    const two = sieveText(GRID_A, 2, 4);
    expect(two[7]).toBe(1);
    expect(two[14]).toBe(1);
    expect(two[35]).toBe(1);
    expect(two[24]).toBe(4);
    expect(sieveText(GRID_A, 3, 4)[24]).toBe(4);
    expect(sieveText(GRID_A, 4, 4)[24]).toBe(1);
    expect(sieveText(GRID_A, 6, 4)[10]).toBe(3);
  });

  it('takes a diagonal pair as one patch with 8 neighbours only', () => {
    const eight = sieveText(GRID_A, 2, 8);
    expect([eight[7], eight[14]]).toEqual([2, 2]);
    expect(eight[35]).toBe(1);
    expect([sieveText(GRID_A, 3, 8)[7], sieveText(GRID_A, 3, 8)[14]]).toEqual([1, 1]);
  });

  it.each([
    ['chain, 2', '1 2 2 3 3 3 9 9 9 9 9 9', 2, '2 2 2 3 3 3 9 9 9 9 9 9'],
    [
      'chain, 3: the pair grows to three pixels by taking in the single one, and stays',
      '1 2 2 3 3 3 9 9 9 9 9 9',
      3,
      '2 2 2 3 3 3 9 9 9 9 9 9',
    ],
    ['chain, 4: three of one, then six of another', '1 2 2 3 3 3 9 9 9 9 9 9', 4, '3 3 3 3 3 3 9 9 9 9 9 9'],
    ['whole map below', '1 2 2', 5, '2 2 2'],
    ['bridge', '1 1 5 1 1 6 6 6', 2, '1 1 1 1 1 6 6 6'],
    ['equal neighbours: the one met first', '1 1 1 5 2 2 2', 2, '1 1 1 1 2 2 2'],
  ])('%s', (_, before, minPixels, after) => {
    expect(sieveText(before, minPixels, 4)).toEqual([...read(after).codes]);
  });

  it('leaves an islet in nodata and says so', () => {
    const { codes, width, height } = read('255 255 255\n255 1 255\n255 255 255');
    const areas = new Float64Array(height).fill(1);
    const out = sieve(codes, width, areas, { minAreaM2: 5, neighbours: 8, nodata: NODATA });
    expect(out).toEqual({ codes, nMerged: 0, nLeft: 1 });
  });

  it('joins patches of the same class that a removed patch had kept apart', () => {
    // Both threes and the two between make five pixels, enough for the minimum; neither alone is.
    expect(sieveText('8 8 8 8 8 8\n3 3 2 3 3 8\n8 8 8 8 8 8', 1, 4)).toHaveLength(18);
    expect(sieveText('3 3 2 3 3', 2, 4)).toEqual([3, 3, 3, 3, 3]);
  });

  it('weighs pixels by the area of their row', () => {
    const { codes, width } = read('1 1 1\n2 2 1\n1 1 1\n3 3 1\n1 1 1');
    const out = sieve(codes, width, Float64Array.of(100, 100, 100, 40, 40), {
      minAreaM2: 200,
      neighbours: 4,
      nodata: NODATA,
    });
    expect(out.codes[3]).toBe(2);
    expect(out.codes[9]).toBe(1);
  });

  it.each([
    [10, 0.5, 50],
    [20, 0.5, 13],
    [30, 0.5, 6],
    [30, 1, 12],
  ])('at %i m a minimum of %f ha keeps patches from %i pixels on', (gsd, minAreaHa, least) => {
    const keeps = (n: number) => {
      const width = 400;
      const codes = new Uint8Array(width).fill(1).fill(2, 100, 100 + n);
      const options = { minAreaM2: minAreaHa * 10_000, neighbours: 4, nodata: NODATA } as const;
      return sieve(codes, width, Float64Array.of(gsd * gsd), options).codes[100] === 2;
    };
    expect([keeps(least - 1), keeps(least)]).toEqual([false, true]);
  });

  const cases = Array.from({ length: 40 }, (_, i) => i + 1);
  it.each(cases)('leaves none below the minimum and keeps the rest (random grid %i)', (seed) => {
    const neighbours = seed % 2 ? 4 : 8;
    const { codes, width, height } = randomGrid(seed, { classes: 2 + (seed % 4), nodataShare: (seed % 5) / 10 });
    const areas = Float64Array.from({ length: height }, (_, row) => 1 + (seed % 3) * row * 0.01);
    const minAreaM2 = 2 + (seed % 7) * 3;
    const options = { minAreaM2, neighbours, nodata: NODATA } as const;
    const before = labelPatches(codes, width, areas, neighbours, NODATA);
    const out = sieve(codes, width, areas, options);
    const after = labelPatches(out.codes, width, areas, neighbours, NODATA);
    const touches = (patch: number) =>
      out.codes.some((_, i) => {
        if (after.labels[i] !== patch) return false;
        const [row, column] = [Math.floor(i / width), i % width];
        return [-1, 0, 1].some((down) =>
          [-1, 0, 1].some((right) => {
            if (neighbours === 4 && down !== 0 && right !== 0) return false;
            const [r, c] = [row + down, column + right];
            if (r < 0 || c < 0 || r >= height || c >= width) return false;
            const other = after.labels[r * width + c]!;
            return other >= 0 && other !== patch;
          }),
        );
      });
    const below = Array.from(after.areaM2, (area, patch) => ({ area, patch })).filter(({ area }) => area < minAreaM2);
    expect(below.filter(({ patch }) => touches(patch))).toEqual([]);
    expect(below).toHaveLength(out.nLeft);
    codes.forEach((code, i) => {
      expect(out.codes[i] === NODATA).toBe(code === NODATA);
      if (code !== NODATA && before.areaM2[before.labels[i]!]! >= minAreaM2) expect(out.codes[i]).toBe(code);
    });
    expect(sieve(out.codes, width, areas, options).codes).toEqual(out.codes);
  });
});

describe('sieve beside gdal_sieve', () => {
  it.each([4, 8] as const)('gives the same where no patch is left to a second look (%i neighbours)', (neighbours) => {
    const { codes, width, height } = read(GRID_A);
    const folder = mkdtempSync(join(tmpdir(), 'sieve-'));
    try {
      const header = `ncols ${width}\nnrows ${height}\nxllcorner 0\nyllcorner 0\ncellsize 1\n`;
      const rows = Array.from({ length: height }, (_, row) => codes.subarray(row * width, (row + 1) * width).join(' '));
      writeFileSync(join(folder, 'in.asc'), `${header}${rows.join('\n')}\n`);
      for (const least of [2, 3, 4]) {
        const out = join(folder, `out-${least}.tif`);
        execFileSync('gdal_sieve.py', [
          '-q',
          '-st',
          String(least),
          `-${neighbours}`,
          '-nomask',
          join(folder, 'in.asc'),
          out,
        ]);
        execFileSync('gdal_translate', ['-q', '-of', 'ENVI', '-ot', 'Byte', out, join(folder, `out-${least}.raw`)]);
        expect(sieveText(GRID_A, least, neighbours)).toEqual([...readFileSync(join(folder, `out-${least}.raw`))]);
      }
    } finally {
      rmSync(folder, { recursive: true });
    }
  });
});

describe('recode', () => {
  it('changes the codes named, where it is asked to', () => {
    const codes = Uint8Array.of(1, 2, 3, 1, 255);
    recode(
      codes,
      makeRecodeTable([
        [1, 2],
        [2, 3],
      ]),
      [0, 1],
    );
    expect([...codes]).toEqual([2, 3, 3, 1, 255]);
    recode(codes, makeRecodeTable([[1, 9]]));
    expect([...codes]).toEqual([2, 3, 3, 9, 255]);
  });
});
