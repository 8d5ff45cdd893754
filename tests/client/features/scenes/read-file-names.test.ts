import { describe, expect, it } from 'vitest';
import {
  namedDays,
  readAcquisitionDay,
  suggestSceneName,
} from '../../../../client/src/features/scenes/read-file-names.ts';

const TODAY = '2026-01-31';
const dayOf = (...names: string[]) => readAcquisitionDay(names, TODAY);

describe('the day of acquisition in file names', () => {
  it('is read year first, with or without signs between', () => {
    expect(dayOf('vennory-2025-09-02-blue.tif')).toBe('2025-09-02');
    expect(dayOf('scene_20250902.tif')).toBe('2025-09-02');
    expect(dayOf('X_20250902T105441_B02.jp2')).toBe('2025-09-02');
    expect(dayOf('a-2025_09_02.tif', 'b-20250902.tif')).toBe('2025-09-02');
  });

  it('is left open where names carry two days, since one of them is the day of processing or another scene', () => {
    expect(dayOf('X_20200518_20200820_B4.tif')).toBeNull();
    expect(dayOf('a-2025-05-09.tif', 'b-2025-09-02.tif')).toBeNull();
    expect(namedDays(['b-2025-09-02.tif', 'a-2025-05-09.tif'], TODAY)).toEqual(['2025-05-09', '2025-09-02']);
  });

  it('is never guessed from days that do not exist, lie ahead, come day first, or are part of a longer figure', () => {
    expect(dayOf('scene-2025-02-30.tif')).toBeNull();
    expect(dayOf('scene-2026-02-01.tif')).toBeNull();
    expect(dayOf('scene-19650101.tif')).toBeNull();
    expect(dayOf('scene-02-09-2025.tif')).toBeNull();
    expect(dayOf('scene-202509021.tif')).toBeNull();
    expect(dayOf('2025-0902.tif')).toBeNull();
    expect(dayOf('scene.tif')).toBeNull();
  });
});

describe('the suggested name of a scene', () => {
  it('is the stem of one file, or what all stems begin with', () => {
    expect(suggestSceneName(['coast-6band.tif'])).toBe('coast-6band');
    expect(suggestSceneName(['vennory-2025-09-02-blue.tif', 'vennory-2025-09-02-green.tif'])).toBe(
      'vennory-2025-09-02',
    );
  });

  it('is the first stem where the files share hardly a letter', () => {
    expect(suggestSceneName(['blue.tif', 'brown.tif'])).toBe('blue');
    expect(suggestSceneName([])).toBe('');
  });

  it('fits the contract', () => {
    expect(suggestSceneName([`${'x'.repeat(300)}.tif`])).toHaveLength(160);
  });
});
