import { describe, expect, it } from 'vitest';
import { INSTRUMENTS } from '../../../../shared/constants/instrument-bands.ts';
import { VALUE_SCALES } from '../../../../shared/constants/value-scales.ts';
import type { BandRole } from '../../../../shared/constants/bands.ts';
import { applyValueScale, fillFromInstrument } from '../../../../client/src/features/scenes/band-presets.ts';
import { presetNote } from '../../../../client/src/features/scenes/preset-note.ts';

const instrument = (id: string) => INSTRUMENTS.find((one) => one.id === id)!;
const scaleOf = (id: string) => VALUE_SCALES.find((one) => one.id === id)!;
const band = (name: string, role: BandRole) => ({
  id: name,
  name,
  role,
  centreWavelengthUm: null,
  gsdMeters: 30,
  scale: 1,
  offset: 0,
  quantity: 'digital number' as const,
});

describe('filling a band table from an instrument', () => {
  it('finds a band by its role', () => {
    const { bands, nChanged, leftNumbers } = fillFromInstrument(
      [band('one', 'blue'), band('two', 'thermal'), band('three', 'other')],
      instrument('tm'),
    );
    expect(bands.map(({ centreWavelengthUm, gsdMeters }) => [centreWavelengthUm, gsdMeters])).toEqual([
      [0.485, 30],
      [11.45, 120],
      [null, 30],
    ]);
    expect([nChanged, leftNumbers]).toEqual([2, [3]]);
  });

  it('finds a band by the code in its name before its role, and then gives it the role', () => {
    const { bands } = fillFromInstrument(
      [band('B8A', 'other'), band('SR_B5', 'other'), band('band 12', 'nir'), band('T31_B02_10m', 'other')],
      instrument('msi'),
    );
    expect(bands.map(({ role, centreWavelengthUm }) => [role, centreWavelengthUm])).toEqual([
      ['nir', 0.865],
      ['red-edge', 0.705],
      ['swir2', 2.19],
      ['blue', 0.49],
    ]);
  });

  it('leaves a band alone where it is not plain which one is meant', () => {
    const one = fillFromInstrument([band('edge', 'red-edge')], instrument('msi'));
    expect(one.leftNumbers).toEqual([1]);
    const three = fillFromInstrument(
      ['a', 'b', 'c'].map((name) => band(name, 'red-edge')),
      instrument('msi'),
    );
    expect(three.bands.map(({ centreWavelengthUm }) => centreWavelengthUm)).toEqual([0.705, 0.74, 0.783]);
  });
});

describe('a product’s scale', () => {
  it('gives the published worked examples (USGS, Collection 2 Level-2: DN 18 639 → 0.313, DN 44 947 → 302.6 K)', () => {
    const bands = [band('red', 'red'), band('heat', 'thermal'), band('x', 'other')];
    const reflective = applyValueScale(bands, scaleOf('oli-c2-l2-reflectance'));
    const both = applyValueScale(reflective.bands, scaleOf('tirs-c2-l2-temperature'));
    const [red, heat, other] = both.bands;
    expect(18_639 * red!.scale + red!.offset).toBeCloseTo(0.3125725, 9);
    expect(44_947 * heat!.scale + heat!.offset).toBeCloseTo(302.62974, 4);
    expect([red!.quantity, heat!.quantity, other]).toEqual(['reflectance', 'kelvin', bands[2]]);
    expect([reflective.leftNumbers, both.leftNumbers]).toEqual([
      [2, 3],
      [1, 3],
    ]);
  });

  it('gives 0.0452 for DN 1452 of MSI from baseline 04.00 on (ESA’s formula)', () => {
    const { bands } = applyValueScale([band('red', 'red')], scaleOf('msi-l2a'));
    expect(1452 * bands[0]!.scale + bands[0]!.offset).toBeCloseTo(0.0452, 9);
  });

  it('says which bands it filled and which it left', () => {
    expect(presetNote('TM', { bands: [], nChanged: 6, leftNumbers: [] })).toBe(
      'TM filled 6\u00A0bands. Nothing is saved yet.',
    );
    expect(presetNote('TM', { bands: [], nChanged: 1, leftNumbers: [2, 3] })).toContain('bands 2, 3 are left');
    expect(presetNote('TM', { bands: [], nChanged: 0, leftNumbers: [1] })).toContain('fits no band');
  });
});

describe('the constants', () => {
  it('have each code once an instrument, and footprints no finer than 10 m', () => {
    for (const { bands } of INSTRUMENTS) {
      expect(new Set(bands.map(({ code }) => code)).size).toBe(bands.length);
      expect(bands.every(({ gsdMeters }) => gsdMeters >= 10)).toBe(true);
    }
  });
});
