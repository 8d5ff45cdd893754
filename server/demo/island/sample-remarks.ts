import { CLASS } from './class-codes.ts';
import type { Rng } from './seeded-rng.ts';

const NOTES: Record<number, readonly string[]> = {
  [CLASS.openWater]: ['Open sea, no swell lines.', 'Clear of the surf.', 'Silty water off the estuary.'],
  [CLASS.tidalFlat]: ['Bare at low water, under water in spring.', 'Firm sand.', 'Mud, edge to the creek uncertain.'],
  [CLASS.saltmarsh]: ['Between the flat and the sea wall.', 'Creeks left in.', 'Upper edge grades into rough grass.'],
  [CLASS.broadleafWoodland]: ['Leaf-off in spring, full in late summer.', 'Valley-side wood.', 'Small gap left in.'],
  [CLASS.coniferPlantation]: ['Dark on both dates, straight edge.', 'Mature stand.', 'Could be a young stand.'],
  [CLASS.heathAndMoor]: ['Heather in flower.', 'Grassy moor.', 'Some peat showing.'],
  [CLASS.improvedPasture]: [
    'Green on both dates.',
    'Cut shortly before the late-summer scene.',
    'Grazed, a bit rough at one end.',
  ],
  [CLASS.arable]: ['Stubble in late summer.', 'Ploughed.', 'Green crop, row lines on the ground photo.'],
  [CLASS.bareRock]: ['Summit rock.', 'Scree below the crag.', 'Some lichen and moss.'],
  [CLASS.builtUp]: ['Houses with gardens.', 'Streets and roofs.', 'Works yard.'],
};

/** How sure the labeller was, and what they wrote down; most write nothing. */
export function writeRemark(
  classCode: number,
  mistake: boolean,
  rng: Rng,
): { confidence: 'low' | 'medium' | 'high'; note: string } {
  const sure = rng.next() - (mistake ? 0.3 : 0);
  const confidence = sure > 0.4 ? 'high' : sure > 0.1 ? 'medium' : 'low';
  const notes = NOTES[classCode];
  const note = notes[rng.int(notes.length)];
  return { confidence, note: rng.next() < 0.42 ? note : '' };
}
