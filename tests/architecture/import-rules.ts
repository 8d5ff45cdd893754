/** Who may import whom. A path belongs to the first layer whose prefix it starts with. */
export interface Layer {
  name: string;
  prefix: string;
  /** Names of layers it may import besides itself. */
  may: readonly string[];
}

export const LAYERS: readonly Layer[] = [
  { name: 'shared', prefix: 'shared/', may: [] },

  { name: 'app', prefix: 'client/src/app/', may: ['pages', 'features', 'components', 'lib', 'shared'] },
  { name: 'pages', prefix: 'client/src/pages/', may: ['features', 'components', 'lib', 'shared'] },
  { name: 'features', prefix: 'client/src/features/', may: ['components', 'lib', 'shared'] },
  { name: 'components', prefix: 'client/src/components/', may: ['lib', 'shared'] },
  { name: 'lib', prefix: 'client/src/lib/', may: ['shared'] },

  {
    name: 'routes',
    prefix: 'server/routes/',
    may: ['policies', 'presenters', 'services', 'middleware', 'entities', 'ground', 'shared'],
  },
  { name: 'middleware', prefix: 'server/middleware/', may: ['services', 'policies', 'entities', 'ground', 'shared'] },
  {
    name: 'presenters',
    prefix: 'server/presenters/',
    may: ['policies', 'services', 'entities', 'jobs', 'ground', 'shared'],
  },
  {
    name: 'services',
    prefix: 'server/services/',
    may: ['policies', 'entities', 'analysis', 'raster', 'storage', 'jobs', 'mail', 'ground', 'shared'],
  },
  { name: 'policies', prefix: 'server/policies/', may: ['shared'] },
  { name: 'jobs', prefix: 'server/jobs/', may: ['entities', 'analysis', 'raster', 'ground', 'shared'] },
  { name: 'storage', prefix: 'server/storage/', may: ['ground', 'shared'] },
  { name: 'mail', prefix: 'server/mail/', may: ['ground', 'shared'] },
  { name: 'entities', prefix: 'server/entities/', may: ['shared'] },
  { name: 'migrations', prefix: 'server/migrations/', may: [] },
  { name: 'raster', prefix: 'server/raster/', may: ['shared'] },
  { name: 'analysis', prefix: 'server/analysis/', may: ['shared'] },
  { name: 'island', prefix: 'server/demo/island/', may: ['shared'] },
  {
    name: 'demo',
    prefix: 'server/demo/',
    may: ['policies', 'island', 'services', 'entities', 'storage', 'jobs', 'raster', 'analysis', 'ground', 'shared'],
  },
  // Config, errors, the app's context: what every server layer stands on. It names the layers' types only.
  { name: 'ground', prefix: 'server/config.ts', may: [] },
  { name: 'ground', prefix: 'server/errors.ts', may: [] },
  { name: 'ground', prefix: 'server/is-process-alive.ts', may: [] },
  { name: 'ground', prefix: 'server/app-context.ts', may: ['jobs', 'mail', 'raster', 'storage'] },
  {
    name: 'start',
    prefix: 'server/',
    may: [
      'routes',
      'middleware',
      'services',
      'jobs',
      'storage',
      'mail',
      'raster',
      'entities',
      'migrations',
      'demo',
      'ground',
      'shared',
    ],
  },
];

export function layerOf(path: string): Layer | undefined {
  return LAYERS.find(({ prefix }) => path.startsWith(prefix));
}

/** Why an import from one file to another is against the layout, or null. */
export function judgeImport(from: string, to: string): string | null {
  const source = layerOf(from);
  const target = layerOf(to);
  if (!source || !target) return `${from} → ${to}: one of them lies in no layer`;
  if (source.name === 'features' && target.name === 'features') {
    const feature = (path: string) => path.split('/')[3];
    return feature(from) === feature(to) ? null : `${from} → ${to}: features never import each other`;
  }
  if (source.name === 'pages' && target.name === 'pages') {
    const page = (path: string) => path.split('/')[3];
    return page(from) === page(to) ? null : `${from} → ${to}: a page never imports another page`;
  }
  if (source.name === target.name || source.may.includes(target.name)) return null;
  return `${from} → ${to}: ${source.name} may not import ${target.name}`;
}
