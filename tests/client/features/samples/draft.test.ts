import { beforeEach, describe, expect, it } from 'vitest';
import {
  draftOfSample,
  draftToCreate,
  fieldsToUpdate,
  isUnchanged,
  newDraft,
} from '../../../../client/src/features/samples/draft.ts';
import { draftKey, readStoredDraft, storeDraft } from '../../../../client/src/features/samples/stored-draft.ts';
import { conflictFields } from '../../../../client/src/features/samples/conflict-fields.ts';
import { makeClass, makeSample, square } from './sample-fixture.ts';

const SCENE = '0b7c2f4e-8d0a-4a52-9c29-3c1d51a0d001';
const CLASS = '0b7c2f4e-8d0a-4a52-9c29-3c1d51a0d002';
const classes = [makeClass('water', 'Open water', 0), makeClass('rock', 'Bare rock', 1)];

describe('a drawing not saved yet', () => {
  it('keeps its identifier from one try to the next, so that a lost answer makes no second sample', () => {
    const draft = newDraft(SCENE, CLASS, square(0), 'high');
    expect(draftToCreate(draft).id).toBe(draftToCreate({ ...draft, note: 'seen' }).id);
    expect(newDraft(SCENE, CLASS, square(0), 'high').id).not.toBe(draft.id);
  });

  it('sends only what was changed, with the version it began from', () => {
    const draft = draftOfSample(makeSample({ version: 3 }));
    expect(isUnchanged(draft)).toBe(true);
    const changed = { ...draft, classId: 'rock', note: '  cliff ' };
    expect(isUnchanged(changed)).toBe(false);
    expect(fieldsToUpdate(changed.base!, changed)).toEqual({ version: 3, classId: 'rock', note: 'cliff' });
  });

  it('sends an outline whose corners moved', () => {
    const draft = { ...draftOfSample(makeSample()), geometry: square(2) };
    expect(fieldsToUpdate(draft.base!, draft)).toEqual({ version: 1, geometry: square(2) });
  });
});

describe('a drawing through a reload', () => {
  const key = draftKey('project', 'person');
  beforeEach(() => localStorage.clear());

  it('comes back as it was', () => {
    const draft = newDraft(SCENE, CLASS, square(0), 'low');
    storeDraft(key, draft);
    expect(readStoredDraft(key)).toEqual(draft);
    storeDraft(key, null);
    expect(readStoredDraft(key)).toBeNull();
  });

  it('is another person’s own', () => {
    storeDraft(key, newDraft(SCENE, CLASS, square(0), 'low'));
    expect(readStoredDraft(draftKey('project', 'other'))).toBeNull();
  });

  it('is forgotten when it cannot be read', () => {
    localStorage.setItem(key, '{"id":1}');
    expect(readStoredDraft(key)).toBeNull();
    expect(localStorage.getItem(key)).toBeNull();
  });
});

describe('two versions of a sample', () => {
  const theirs = makeSample({ version: 4, note: 'Seen from the road', geometry: square(1) });
  const mine = { ...draftOfSample(makeSample({ version: 3 })), classId: 'rock', confidence: 'high' as const };

  it('are told apart field by field', () => {
    expect(conflictFields(theirs, mine, classes)).toEqual([
      { label: 'Class', theirs: 'Open water', mine: 'Bare rock' },
      { label: 'Outline', theirs: '4 corners', mine: '4 corners' },
      { label: 'Confidence', theirs: 'Medium', mine: 'High' },
      { label: 'Note', theirs: 'Seen from the road', mine: 'none' },
    ]);
  });

  it('saves all of mine over theirs, at their version', () => {
    expect(fieldsToUpdate(theirs, mine)).toEqual({
      version: 4,
      classId: 'rock',
      geometry: square(0),
      confidence: 'high',
      note: '',
    });
  });
});
