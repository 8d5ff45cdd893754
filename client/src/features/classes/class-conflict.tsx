import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import type { ConflictRow } from '../../components/ui/conflict-note.tsx';

type Fields = Pick<LandClass, 'code' | 'name' | 'colour' | 'definition'>;

/** The fields two versions of a class disagree on, ready to print. */
export function differingFields(theirs: Fields, mine: Fields): ConflictRow[] {
  const rows: ConflictRow[] = [];
  if (theirs.code !== mine.code) rows.push({ label: 'Code', theirs: theirs.code, mine: mine.code });
  if (theirs.name !== mine.name) rows.push({ label: 'Name', theirs: theirs.name, mine: mine.name });
  if (theirs.colour.toLowerCase() !== mine.colour.toLowerCase()) {
    rows.push({ label: 'Colour', theirs: printColour(theirs.colour), mine: printColour(mine.colour) });
  }
  if (theirs.definition !== mine.definition) {
    rows.push({ label: 'Definition', theirs: theirs.definition || 'none', mine: mine.definition || 'none' });
  }
  return rows;
}

function printColour(colour: string) {
  return (
    <>
      <ClassSwatch colour={colour} pattern={null} className="mr-2" />
      {colour}
    </>
  );
}
