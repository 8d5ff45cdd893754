import { accountRoutes } from './accounts/routes.ts';
import { accuracyRoutes } from './accuracy/routes.ts';
import { blockRoutes } from './blocks/routes.ts';
import { classRoutes } from './classes/routes.ts';
import { designRoutes } from './designs/routes.ts';
import { eventRoutes } from './events/routes.ts';
import { jobRoutes } from './jobs/routes.ts';
import { memberRoutes } from './members/routes.ts';
import { createOpenApiRoutes } from './openapi/routes.ts';
import { projectRoutes } from './projects/routes.ts';
import { recipeRoutes } from './recipes/routes.ts';
import type { Route } from './route.ts';
import { runRoutes } from './runs/routes.ts';
import { sampleRoutes } from './samples/routes.ts';
import { presenceRoutes } from './samples/presence-routes.ts';
import { sampleReviewRoutes } from './samples/review-routes.ts';
import { signatureRoutes } from './samples/signature-routes.ts';
import { sceneRoutes } from './scenes/routes.ts';
import { sessionRoutes } from './session/routes.ts';
import { zoneRoutes } from './zones/routes.ts';
import { tuningRoutes } from './tunings/routes.ts';

/** Every route of the product, in the order the API document lists them. */
export const routes: readonly Route[] = [
  ...sessionRoutes,
  ...accountRoutes,
  ...projectRoutes,
  ...memberRoutes,
  ...sceneRoutes,
  ...classRoutes,
  ...sampleRoutes,
  ...sampleReviewRoutes,
  ...blockRoutes,
  ...presenceRoutes,
  ...signatureRoutes,
  ...runRoutes,
  ...jobRoutes,
  ...recipeRoutes,
  ...tuningRoutes,
  ...accuracyRoutes,
  ...designRoutes,
  ...zoneRoutes,
  ...eventRoutes,
  ...createOpenApiRoutes(() => routes),
];
