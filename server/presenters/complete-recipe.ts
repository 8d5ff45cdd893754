import type { Recipe } from '../../shared/contracts/run.ts';
import { sampleStateSchema } from '../../shared/contracts/sample.ts';

/** How recipes worked before these settings came: samples of every review state were used. */
const BEFORE: Partial<Recipe> = { sampleStates: [...sampleStateSchema.options] };

/** A stored recipe with the settings it lacks, as they were in effect when it was stored. */
export function completeRecipe(stored: Recipe): Recipe {
  return { ...BEFORE, ...stored };
}
