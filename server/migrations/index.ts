import { Init1796099110473 } from './1796099110473-init.ts';
import { SiteSettings1796100000000 } from './1796100000000-site-settings.ts';
import { SceneGuessedRoles1796101200000 } from './1796101200000-scene-guessed-roles.ts';
import { RunSnapshot1796101500000 } from './1796101500000-run-snapshot.ts';
import { ReferenceDesigns1796104000000 } from './1796104000000-reference-designs.ts';
import { ZoneLayers1796117000000 } from './1796117000000-zone-layers.ts';
import { QueueAndRecipes1796118000000 } from './1796118000000-queue-and-recipes.ts';
import { ReviewAndBlocks1796118600000 } from './1796118600000-review-and-blocks.ts';
import { PostProcessing1796120000000 } from './1796120000000-post-processing.ts';

/** In the order they run; a new one goes to the end. */
export const migrations = [
  Init1796099110473,
  SiteSettings1796100000000,
  SceneGuessedRoles1796101200000,
  RunSnapshot1796101500000,
  ReferenceDesigns1796104000000,
  ZoneLayers1796117000000,
  QueueAndRecipes1796118000000,
  ReviewAndBlocks1796118600000,
  PostProcessing1796120000000,
];
