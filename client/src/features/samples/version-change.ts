import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import type { SampleVersion } from '../../../../shared/contracts/sample.ts';
import { formatCount } from '../../lib/format.ts';
import { CONFIDENCE_TEXT } from './confidence-text.ts';
import { isSameOutline } from './draft.ts';

const CHANGE_TEXT: Record<SampleVersion['change'], string> = {
  created: 'Drawn',
  edited: 'Changed',
  deleted: 'Deleted',
  restored: 'Restored',
};

/** What a version did, against the one before it: "Changed: outline, class to Saltmarsh". */
export function describeVersion(
  version: SampleVersion,
  before: SampleVersion | undefined,
  classes: readonly Pick<LandClass, 'id' | 'name'>[],
): string {
  const verb = CHANGE_TEXT[version.change];
  const className = classes.find((one) => one.id === version.classId)?.name ?? 'a class taken away';
  if (!before) return `${verb} as ${className}, ${formatCount(version.pixelCount, 'pixel')}`;
  const parts: string[] = [];
  if (version.classId !== before.classId) parts.push(`class to ${className}`);
  if (!isSameOutline(version.geometry, before.geometry)) {
    parts.push(`outline, now ${formatCount(version.pixelCount, 'pixel')}`);
  }
  if (version.confidence !== before.confidence) {
    parts.push(`confidence to ${CONFIDENCE_TEXT[version.confidence].toLowerCase()}`);
  }
  if (version.note !== before.note) parts.push(version.note ? 'note' : 'note taken out');
  return parts.length > 0 ? `${verb}: ${parts.join('; ')}` : verb;
}
