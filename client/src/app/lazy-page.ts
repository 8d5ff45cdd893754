import type { ComponentType } from 'react';

/**
 * A route's `lazy` for a page module: `lazy: lazyPage(() => import('../pages/runs/runs-page.tsx'), 'RunsPage')`.
 *
 * @throws Error when the module does not export the page by that name
 */
export function lazyPage<Name extends string>(
  load: () => Promise<Record<Name, ComponentType>>,
  name: Name,
): () => Promise<{ Component: ComponentType }> {
  return async () => ({ Component: (await load())[name] });
}
