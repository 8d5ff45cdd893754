import type { Polygon } from '../../../../shared/contracts/geometry.ts';
import type { Confidence, CreateSample, Sample, UpdateSample } from '../../../../shared/contracts/sample.ts';

/** What of a sample a person decides. */
export type SampleFields = Pick<Sample, 'classId' | 'geometry' | 'confidence' | 'note'>;

/** A drawing not saved yet: a new sample, or a change of one that stands. */
export interface Draft extends SampleFields {
  /** The sample's id, made here for a new one: saving again after a lost answer makes no second sample. */
  id: string;
  sceneId: string;
  /** The sample as it stood when its edit began; null for a new one. */
  base: (SampleFields & { number: number; version: number }) | null;
  /** When the drawing began, ISO 8601. */
  startedAt: string;
}

export function newDraft(sceneId: string, classId: string, geometry: Polygon, confidence: Confidence): Draft {
  return {
    id: crypto.randomUUID(),
    sceneId,
    classId,
    geometry,
    confidence,
    note: '',
    base: null,
    startedAt: new Date().toISOString(),
  };
}

export function draftOfSample(sample: Sample): Draft {
  const { id, sceneId, number, version } = sample;
  const fields = sampleFields(sample);
  return { id, sceneId, ...fields, base: { ...fields, number, version }, startedAt: new Date().toISOString() };
}

export function sampleFields({ classId, geometry, confidence, note }: SampleFields): SampleFields {
  return { classId, geometry, confidence, note };
}

/** True when two outlines have the same corners in the same order. */
export function isSameOutline(first: Polygon, second: Polygon): boolean {
  return JSON.stringify(first.coordinates) === JSON.stringify(second.coordinates);
}

/** True when saving would change nothing. */
export function isUnchanged(draft: Draft): boolean {
  return draft.base !== null && Object.keys(changedFields(draft.base, draft)).length === 0;
}

/** The fields of `next` that differ from `before`. */
export function changedFields(before: SampleFields, next: SampleFields): Partial<SampleFields> {
  return {
    ...(next.classId !== before.classId && { classId: next.classId }),
    ...(!isSameOutline(next.geometry, before.geometry) && { geometry: next.geometry }),
    ...(next.confidence !== before.confidence && { confidence: next.confidence }),
    ...(next.note.trim() !== before.note && { note: next.note.trim() }),
  };
}

export function draftToCreate({ id, sceneId, classId, geometry, confidence, note }: Draft): CreateSample {
  return { id, sceneId, classId, geometry, confidence, note: note.trim() };
}

/**
 * What to send to make `fields` stand over a known state: only what differs, so that what the other person changed
 * elsewhere stays.
 */
export function fieldsToUpdate(over: SampleFields & { version: number }, fields: SampleFields): UpdateSample {
  return { version: over.version, ...changedFields(over, fields) };
}
