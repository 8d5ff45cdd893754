import { beforeEach, describe, expect, it } from 'vitest';
import {
  hiddenViews,
  keepContextChoice,
  readContextChoice,
} from '../../../../client/src/components/place/context-choice.ts';

beforeEach(() => localStorage.clear());

describe('how a person looks at places', () => {
  it('is kept for the person and the project, and for nobody else', () => {
    const choice = { hidden: ['s shortwave'], hasOutlines: false, isLocal: true, zoomSteps: 2 };
    keepContextChoice('project', 'me', choice);
    expect(readContextChoice('project', 'me')).toEqual(choice);
    expect(readContextChoice('project', 'someone else').hidden).toBeNull();
    expect(readContextChoice('other project', 'me').zoomSteps).toBe(0);
  });

  it('is the first choice where the text kept can no longer be read', () => {
    localStorage.setItem(
      'groundsel.context.project.me',
      '{"hidden":[],"hasOutlines":true,"isLocal":true,"zoomSteps":99}',
    );
    expect(readContextChoice('project', 'me')).toMatchObject({ hidden: null, isLocal: false, zoomSteps: 0 });
    localStorage.setItem('groundsel.context.project.me', 'no');
    expect(readContextChoice('project', 'me').hasOutlines).toBe(true);
  });

  it('leaves the thermal picture out until it is asked for', () => {
    const views = ['natural', 'thermal'].map((compositeId) => ({ id: `s ${compositeId}`, view: { compositeId } }));
    const hidden = (choice: string[] | null) => [
      ...hiddenViews(
        { hidden: choice, hasOutlines: true, isLocal: false, zoomSteps: 0 },
        views as unknown as Parameters<typeof hiddenViews>[1],
      ),
    ];
    expect(hidden(null)).toEqual(['s thermal']);
    expect(hidden([])).toEqual([]);
  });
});
