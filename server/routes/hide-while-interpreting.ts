import { requireMapsShown } from '../services/design-blindness.ts';
import type { Route } from './route.ts';

/** A route that tells something of a class map: refused to interpreters while reference points of the project are open. */
export function hideWhileInterpreting(route: Route): Route {
  return {
    ...route,
    isHiddenWhileInterpreting: true,
    async handle(context) {
      await requireMapsShown(context.app, context.target.projectId, context.viewer);
      return route.handle(context);
    },
  };
}
