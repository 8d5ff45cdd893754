import { describe, expect, it } from 'vitest';
import {
  type SceneValues,
  overwrittenValues,
  sceneFormSchema,
} from '../../../../client/src/features/scenes/scene-values.ts';

const values = (): SceneValues => ({
  name: 'Spring',
  acquiredOn: '2025-05-09',
  bands: [
    {
      id: '00000000-0000-4000-8000-000000000001',
      name: 'Red',
      role: 'red',
      centreWavelengthUm: 0.66,
      gsdMeters: 30,
      scale: 0.000025,
      offset: -0.15,
      quantity: 'reflectance',
    },
  ],
});

describe('the form of a scene', () => {
  it('makes an emptied date no date and trims the name', () => {
    expect(sceneFormSchema.parse({ ...values(), acquiredOn: '', name: ' Spring ' })).toEqual({
      ...values(),
      acquiredOn: null,
    });
  });

  it('refuses an emptied scale or offset, a scale of 0 and a wavelength below 0, each at its field', () => {
    const [band] = values().bands;
    const issues = (change: object) =>
      sceneFormSchema.safeParse({ ...values(), bands: [{ ...band, ...change }] }).error?.issues.map(({ path }) => path);
    expect(issues({ scale: null })).toEqual([['bands', 0, 'scale']]);
    expect(issues({ scale: 0 })).toEqual([['bands', 0, 'scale']]);
    expect(issues({ offset: null })).toEqual([['bands', 0, 'offset']]);
    expect(issues({ centreWavelengthUm: -1 })).toEqual([['bands', 0, 'centreWavelengthUm']]);
    expect(issues({ centreWavelengthUm: null, gsdMeters: null })).toBeUndefined();
  });
});

describe('a conflict', () => {
  it('shows what the other person changed and mine would overwrite, and nothing else', () => {
    const [theirs, mine] = [values(), values()];
    theirs.name = 'May';
    theirs.bands[0]!.role = 'nir';
    theirs.bands[0]!.gsdMeters = 20;
    mine.bands[0]!.gsdMeters = 20;
    mine.bands[0]!.scale = 1;
    mine.acquiredOn = null;
    expect(overwrittenValues(values(), theirs, mine)).toEqual([
      { label: 'Name', theirs: 'May', mine: 'Spring' },
      { label: 'Band 1, role', theirs: 'Near infrared', mine: 'Red' },
    ]);
  });
});
