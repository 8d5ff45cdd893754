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

const BAND_FIELDS: readonly { label: string; print: (values: BandValues) => string }[] = [
  { label: 'name', print: ({ name }) => name },
  { label: 'role', print: ({ role }) => BAND_ROLE_NAME[role] },
  { label: 'wavelength', print: (band) => printNumber(band.centreWavelengthUm, 'µm') },
  { label: 'ground sample', print: (band) => printNumber(band.gsdMeters, 'm') },
  { label: 'scale', print: ({ scale }) => String(scale) },
  { label: 'offset', print: ({ offset }) => String(offset) },
  { label: 'quantity', print: ({ quantity }) => quantity },
];

function printNumber(value: number | null, unit: string): string {
  return value === null ? 'not given' : `${value} ${unit}`;
}

const printDay = (day: string | null) => (day ? formatCalendarDate(day) : 'not given');

/**
 * What someone else changed since the form was opened and the form has otherwise: what "mine" would overwrite.
 *
 * @param base the scene as the form was opened on it
 */
export function overwrittenValues(base: SceneValues, theirs: SceneValues, mine: SceneValues): ConflictRow[] {
  const rows: ConflictRow[] = [];
  const compare = (label: string, was: string, now: string, own: string) => {
    if (now !== was && now !== own) rows.push({ label, theirs: now, mine: own });
  };
  compare('Name', base.name, theirs.name, mine.name);
  compare('Acquired on', printDay(base.acquiredOn), printDay(theirs.acquiredOn), printDay(mine.acquiredOn));
  theirs.bands.forEach((band, index) => {
    const was = base.bands.find(({ id }) => id === band.id);
    const own = mine.bands.find(({ id }) => id === band.id);
    if (!was || !own) return;
    for (const { label, print } of BAND_FIELDS) {
      compare(`Band ${index + 1}, ${label}`, print(was), print(band), print(own));
    }
  });
  return rows;
}
