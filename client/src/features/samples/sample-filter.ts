import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import type { Confidence, Sample, SampleState } from '../../../../shared/contracts/sample.ts';

export interface SampleFilter {
  text: string;
  classId: string | null;
  authorId: string | null;
  confidence: Confidence | null;
  state: SampleState | null;
  blockId: string | null;
  /** Only samples with open comments. */
  hasRemarks: boolean;
}

export const NO_FILTER: SampleFilter = {
  text: '',
  classId: null,
  authorId: null,
  confidence: null,
  state: null,
  blockId: null,
  hasRemarks: false,
};

export function isFiltering(filter: SampleFilter): boolean {
  return (
    filter.text.trim() !== '' ||
    Boolean(filter.classId ?? filter.authorId ?? filter.confidence ?? filter.state ?? filter.blockId) ||
    filter.hasRemarks
  );
}

/**
 * The samples a filter lets through. Each word of the text must begin a word of the number, the class's name, the
 * author or the note: "2" finds sample 25, not 12.
 */
export function filterSamples(
  samples: readonly Sample[],
  filter: SampleFilter,
  classes: ReadonlyMap<string, LandClass>,
): Sample[] {
  const words = filter.text.trim().toLowerCase().split(/\s+/).filter(Boolean);
  return samples.filter((sample) => {
    if (filter.classId && sample.classId !== filter.classId) return false;
    if (filter.authorId && sample.createdBy?.id !== filter.authorId) return false;
    if (filter.confidence && sample.confidence !== filter.confidence) return false;
    if (filter.state && sample.state !== filter.state) return false;
    if (filter.blockId && sample.blockId !== filter.blockId) return false;
    if (filter.hasRemarks && sample.openRemarks === 0) return false;
    if (words.length === 0) return true;
    const className = classes.get(sample.classId)?.name ?? '';
    const text = `${sample.number} ${className} ${sample.createdBy?.name ?? ''} ${sample.note}`.toLowerCase();
    const found = text.split(/[^\p{Letter}\p{Number}]+/u);
    return words.every((word) => found.some((one) => one.startsWith(word)));
  });
}

/** Who drew the samples, once each, by name. */
export function sampleAuthors(samples: readonly Sample[]): { id: string; name: string }[] {
  const authors = new Map<string, { id: string; name: string }>();
  for (const { createdBy } of samples) if (createdBy) authors.set(createdBy.id, createdBy);
  return [...authors.values()].sort((first, second) => first.name.localeCompare(second.name));
}
