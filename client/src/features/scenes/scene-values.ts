import { z } from 'zod';
import { BAND_ROLE_NAME } from '../../../../shared/constants/bands.ts';
import { type Scene, updateSceneSchema } from '../../../../shared/contracts/scene.ts';
import type { ConflictRow } from '../../components/ui/conflict-note.tsx';
import { formatCalendarDate } from '../../lib/format-date.ts';

const bandsSchema = updateSceneSchema.shape.bands.unwrap();
const aNumber = (message: string) => z.number({ error: message });
const bandFormSchema = bandsSchema.element.extend({
  scale: aNumber('Type a scale; 1 leaves the stored values.').pipe(bandsSchema.element.shape.scale),
  offset: aNumber('Type an offset; 0 adds nothing.'),
});

/** The contract's fields, all of them said here; an emptied date is no date. */
export const sceneFormSchema = z.object({
  name: updateSceneSchema.shape.name.unwrap(),
  acquiredOn: z.union([z.literal('').transform(() => null), updateSceneSchema.shape.acquiredOn.unwrap()]),
  bands: z.array(bandFormSchema),
});
export type SceneFormInput = z.input<typeof sceneFormSchema>;
export type SceneValues = z.output<typeof sceneFormSchema>;
export type BandValues = SceneValues['bands'][number];

/** What the form starts from. */
export function sceneValuesOf(scene: Pick<Scene, 'name' | 'acquiredOn' | 'bands'>): SceneValues {
  return {
    name: scene.name,
    acquiredOn: scene.acquiredOn,
    bands: scene.bands.map(({ id, name, role, centreWavelengthUm, gsdMeters, scale, offset, quantity }) => ({
      ...{ id, name, role, centreWavelengthUm, gsdMeters, scale, offset, quantity },
    })),
  };
}

const BAND_FIELDS: readonly { key: keyof BandValues; label: string; print: (values: BandValues) => string }[] = [
  { key: 'name', label: 'name', print: ({ name }) => name },
  { key: 'role', label: 'role', print: ({ role }) => BAND_ROLE_NAME[role] },
  { key: 'centreWavelengthUm', label: 'wavelength', print: (band) => printNumber(band.centreWavelengthUm, 'µm') },
  { key: 'gsdMeters', label: 'ground sample', print: (band) => printNumber(band.gsdMeters, 'm') },
  { key: 'scale', label: 'scale', print: ({ scale }) => String(scale) },
  { key: 'offset', label: 'offset', print: ({ offset }) => String(offset) },
  { key: 'quantity', label: 'quantity', print: ({ quantity }) => quantity },
];

function printNumber(value: number | null, unit: string): string {
  return value === null ? 'not given' : `${value} ${unit}`;
}

const printDay = (day: string | null) => (day ? formatCalendarDate(day) : 'not given');

/** The fields on which the scene as it stands and the form differ. */
export function differingValues(theirs: SceneValues, mine: SceneValues): ConflictRow[] {
  const rows: ConflictRow[] = [];
  if (theirs.name !== mine.name) rows.push({ label: 'Name', theirs: theirs.name, mine: mine.name });
  if ((theirs.acquiredOn || null) !== (mine.acquiredOn || null)) {
    rows.push({ label: 'Acquired on', theirs: printDay(theirs.acquiredOn), mine: printDay(mine.acquiredOn) });
  }
  theirs.bands.forEach((band, index) => {
    const own = mine.bands.find(({ id }) => id === band.id);
    if (!own) return;
    for (const { key, label, print } of BAND_FIELDS) {
      if (band[key] !== own[key]) {
        rows.push({ label: `Band ${index + 1}, ${label}`, theirs: print(band), mine: print(own) });
      }
    }
  });
  return rows;
}
