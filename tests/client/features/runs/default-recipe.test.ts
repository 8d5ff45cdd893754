import { describe, expect, it } from 'vitest';
import { isCoarse } from '../../../../client/src/features/runs/band-choice.ts';
import { defaultBandIds, defaultDraft, draftFromRun } from '../../../../client/src/features/runs/default-recipe.ts';
import { startRunSchema } from '../../../../shared/contracts/run.ts';
import { makeBand, makeClass, makeScene, uuid } from './recipe-ground.ts';

const classes = [makeClass(1, 8), makeClass(2, 2), makeClass(3, 1), makeClass(4, 0)];

describe('the recipe a form starts with', () => {
  it('takes the newest scene that is ready', () => {
    const scenes = [makeScene(1), makeScene(2), makeScene(3, { state: 'ingesting' })];
    expect(defaultDraft(scenes, classes)?.recipe.sceneId).toBe(uuid(2));
    expect(defaultDraft([makeScene(3, { state: 'failed' })], classes)).toBeNull();
  });

  it('takes the classes that can be split, and no thermal band', () => {
    const draft = defaultDraft([makeScene(1)], classes);
    expect(draft?.recipe.classIds).toEqual([uuid(201), uuid(202)]);
    expect(draft?.recipe.bandIds).toEqual([uuid(101), uuid(102)]);
  });

  it('takes a thermal band when there is no other', () => {
    expect(defaultBandIds([makeBand(1, 'thermal')])).toEqual([uuid(101)]);
  });

  it('is one the server takes', () => {
    expect(startRunSchema.safeParse(defaultDraft([makeScene(1)], classes)).success).toBe(true);
  });
});

describe('a recipe used again', () => {
  const { recipe } = defaultDraft([makeScene(1), makeScene(2)], classes)!;
  const run = { number: 4, name: 'Spring', note: '', recipe: { ...recipe, seed: 77 } };

  it('is the same where all of it is still there', () => {
    const again = draftFromRun(run, [makeScene(1), makeScene(2)], classes);
    expect(again.draft.recipe).toEqual(run.recipe);
    expect(again.lost).toEqual([]);
  });

  it('says what is gone, and falls back on what there is', () => {
    const again = draftFromRun(run, [makeScene(1)], classes.slice(1));
    expect(again.lost).toEqual(['its scene', 'some of its classes']);
    expect(again.draft.recipe).toMatchObject({ sceneId: uuid(1), classIds: [uuid(202)], seed: 77 });
  });
});

describe('a coarse band', () => {
  it('is one measured well wider than the finest', () => {
    const bands = [
      makeBand(1, 'red', 30),
      makeBand(2, 'thermal', 90),
      makeBand(3, 'pan', 15),
      makeBand(4, 'other', null),
    ];
    expect(bands.map((band) => isCoarse(band, bands))).toEqual([true, true, false, false]);
    expect(isCoarse(bands[0]!, bands.slice(0, 2))).toBe(false);
  });
});
