import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import { CONFIDENCE_TEXT } from './confidence-text.ts';
import { type SampleFields, isSameOutline } from './draft.ts';

/** What two versions of a sample disagree on, in words; the outlines are drawn beside them. */
export function conflictFields(
  theirs: SampleFields,
  mine: SampleFields,
  classes: readonly Pick<LandClass, 'id' | 'name'>[],
): { label: string; theirs: string; mine: string }[] {
  const nameOf = (id: string) => classes.find((one) => one.id === id)?.name ?? 'a class taken away';
  const corners = ({ geometry }: SampleFields) => `${(geometry.coordinates[0]?.length ?? 1) - 1} corners`;
  const rows: { label: string; theirs: string; mine: string }[] = [];
  if (theirs.classId !== mine.classId) {
    rows.push({ label: 'Class', theirs: nameOf(theirs.classId), mine: nameOf(mine.classId) });
  }
  if (!isSameOutline(theirs.geometry, mine.geometry)) {
    rows.push({ label: 'Outline', theirs: corners(theirs), mine: corners(mine) });
  }
  if (theirs.confidence !== mine.confidence) {
    rows.push({
      label: 'Confidence',
      theirs: CONFIDENCE_TEXT[theirs.confidence],
      mine: CONFIDENCE_TEXT[mine.confidence],
    });
  }
  if (theirs.note !== mine.note.trim()) {
    rows.push({ label: 'Note', theirs: theirs.note || 'none', mine: mine.note.trim() || 'none' });
  }
  return rows;
}
