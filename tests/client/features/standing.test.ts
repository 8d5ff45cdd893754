import { describe, expect, it } from 'vitest';
import type { Overview } from '../../../shared/contracts/project.ts';
import { describeStanding } from '../../../client/src/features/projects/standing.ts';

type Figures = Overview['figures'];

const tally = (name: string, samples: number) => ({
  classId: 'a3f0a3a4-6f5c-4f10-9d3b-7f2a4c1f9a01',
  name,
  colour: '#294483',
  code: 1,
  samples,
  pixels: samples * 10,
});

function say(figures: Partial<Figures>, targets: { accuracy?: number; samples?: number } = {}): string {
  const { before, figure, after } = describeStanding(
    { sceneCount: 0, sampleCount: 0, samplesPerClass: [], bestRun: null, ...figures },
    { targetOverallAccuracy: targets.accuracy ?? null, targetSamplesPerClass: targets.samples ?? null },
  );
  return (before + figure + after).replaceAll(/[\u00A0\u202F]/g, ' ');
}

describe('where a commission stands', () => {
  it('names the first step while there is nothing', () => {
    expect(say({})).toBe('The work begins with a scene and a class scheme.');
  });

  it('counts scenes, then classes, before there are samples', () => {
    expect(say({ sceneCount: 1 })).toBe('There is one scene; the class scheme is next.');
    expect(say({ sceneCount: 2 })).toBe('There are 2 scenes; the class scheme is next.');
    expect(say({ samplesPerClass: [tally('Heath', 0)] })).toBe(
      'The scheme has 1 class; a scene to draw on is still to come.',
    );
  });

  it('reads samples against their target and names the thinnest class', () => {
    const samplesPerClass = [tally('Heath', 25), tally('Bare rock', 7), tally('Arable', 30)];
    expect(say({ sampleCount: 62, samplesPerClass }, { samples: 25 })).toBe(
      '2 of 3 classes have the 25 samples asked for; Bare rock is the thinnest with 7.',
    );
    expect(say({ sampleCount: 62, samplesPerClass }, { samples: 7 })).toBe(
      '3 of 3 classes have the 7 samples asked for.',
    );
    expect(say({ sampleCount: 62, samplesPerClass })).toBe(
      '62 samples of 3 classes are drawn; no map has been made yet.',
    );
  });

  it('says of a run only what it says of the held-out pixels, and whether the target is met', () => {
    const bestRun = {
      id: 'a3f0a3a4-6f5c-4f10-9d3b-7f2a4c1f9a01',
      number: 3,
      overallAccuracy: 0.9125,
      low: 0.88,
      high: 0.94,
    };
    const figures = { sampleCount: 9, samplesPerClass: [tally('Heath', 9)], bestRun };
    expect(say(figures)).toBe('Run 3 agrees with 91.3 % of the pixels held out from it, give or take 3.');
    expect(say(figures, { accuracy: 0.85 })).toMatch(/; the target of 85 % is met\.$/);
    expect(say(figures, { accuracy: 0.9 })).toMatch(/; whether the target of 90 % is met is uncertain\.$/);
    expect(say(figures, { accuracy: 0.95 })).toMatch(/; the target of 95 % is missed\.$/);
  });

  it('goes back to the samples when the best run has no accuracy', () => {
    const bestRun = { id: 'x', number: 1, overallAccuracy: null, low: null, high: null };
    expect(say({ sampleCount: 1, samplesPerClass: [tally('Heath', 1)], bestRun })).toBe(
      '1 sample of 1 class is drawn; no map has been made yet.',
    );
  });
});
