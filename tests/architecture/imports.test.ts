import { cruise } from 'dependency-cruiser';
import { readFileSync, readdirSync } from 'node:fs';
import { join, relative } from 'node:path';
import { beforeAll, describe, expect, it } from 'vitest';
import { judgeImport, layerOf } from './import-rules.ts';

const root = join(import.meta.dirname, '../..');

interface Edge {
  from: string;
  to: string;
  external: boolean;
  found: boolean;
  typeOnly: boolean;
}

/** Paths of all TypeScript files below some folders, from the top folder. */
function listSources(...dirs: string[]): string[] {
  return dirs
    .flatMap((dir) => readdirSync(join(root, dir), { recursive: true, withFileTypes: true }))
    .filter((entry) => entry.isFile() && /\.tsx?$/.test(entry.name))
    .map((entry) => relative(root, join(entry.parentPath, entry.name)));
}

let edges: Edge[] = [];
let circles: string[] = [];

function groupByStart(imports: readonly Edge[]): Map<string, Edge[]> {
  const groups = new Map<string, Edge[]>();
  for (const edge of imports) groups.set(edge.from, [...(groups.get(edge.from) ?? []), edge]);
  return groups;
}

/** Import paths that lead back to their start, each told once by the edge that closes it. */
function findCircles(imports: readonly Edge[]): string[] {
  const next = groupByStart(imports);
  const state = new Map<string, 'open' | 'done'>();
  const found: string[] = [];
  const visit = (path: string): void => {
    state.set(path, 'open');
    for (const { to } of next.get(path) ?? []) {
      if (state.get(to) === 'open') found.push(`${path} → ${to}`);
      else if (!state.has(to)) visit(to);
    }
    state.set(path, 'done');
  };
  for (const path of next.keys()) if (!state.has(path)) visit(path);
  return found;
}

beforeAll(async () => {
  const { output } = await cruise(
    ['client/src', 'server', 'shared'],
    {
      baseDir: root,
      doNotFollow: { path: 'node_modules' },
      tsPreCompilationDeps: true,
    },
    { extensions: ['.ts', '.tsx', '.mjs', '.js'] },
  );
  if (typeof output === 'string') throw new Error('dependency-cruiser gave text, wanted its result object');
  edges = output.modules.flatMap((module) =>
    module.dependencies.map((dependency) => ({
      from: module.source,
      to: dependency.resolved,
      external:
        dependency.dependencyTypes.some((type) => type.startsWith('npm') || type === 'core') ||
        dependency.resolved.includes('node_modules'),
      found: !dependency.couldNotResolve,
      typeOnly: dependency.dependencyTypes.includes('type-only'),
    })),
  );
  // Entities name each other in both directions, which TypeORM's lazy type functions are made for.
  circles = findCircles(
    edges.filter(({ external, typeOnly, from }) => !external && !typeOnly && !from.startsWith('server/entities/')),
  );
});

describe('imports', () => {
  it('resolves every import of the tree, relative ones too', () => {
    const lost = edges.filter(({ found, external, to }) => !found && !external && to.startsWith('.'));
    expect(lost).toEqual([]);
    expect(edges.filter(({ external }) => !external).length).toBeGreaterThan(200);
  });

  it('follows the layers: who may import whom', () => {
    const ours = edges.filter(({ external, to, found }) => found && !external && /^(client|server|shared)\//.test(to));
    const sources = ours.filter(({ from, to }) => /\.(ts|tsx)$/.test(from) && /\.(ts|tsx)$/.test(to));
    expect(sources.map(({ from, to }) => judgeImport(from, to)).filter((reason) => reason !== null)).toEqual([]);
  });

  it('lets only routes and middleware see Express', () => {
    const seeing = edges.filter(({ to }) => /node_modules\/(@types\/)?express\//.test(to)).map(({ from }) => from);
    expect(seeing.filter((from) => !/^server\/(routes|middleware)\/|^server\/app\.ts$/.test(from))).toEqual([]);
    expect(seeing.length).toBeGreaterThan(0);
  });

  it('keeps the numeric core pure: no node modules, no clock, no dice of its own', () => {
    const impure = edges.filter(
      ({ from, to }) =>
        from.startsWith('server/analysis/') &&
        /^(node:)?(fs|path|os|child_process|worker_threads|crypto|timers)/.test(to),
    );
    expect(impure).toEqual([]);
    const impureLines = listSources('server/analysis').flatMap((path) =>
      readFileSync(join(root, path), 'utf8')
        .split('\n')
        .filter((line) => /Math\.random|Date\.now|new Date\(|performance\.now/.test(line))
        .map((line) => `${path}: ${line.trim()}`),
    );
    expect(impureLines).toEqual([]);
  });

  it('has no circle of value imports', () => {
    expect(circles).toEqual([]);
  });

  it('puts every source file in a layer', () => {
    const files = listSources('client/src', 'server', 'shared');
    expect(files.filter((path) => !layerOf(path))).toEqual([]);
    expect(files.length).toBeGreaterThan(100);
  });
});

describe('the judge itself', () => {
  it('finds a circle and lets a diamond be', () => {
    const edge = (from: string, to: string): Edge => ({ from, to, external: false, found: true, typeOnly: false });
    expect(findCircles([edge('a', 'b'), edge('b', 'c'), edge('c', 'a')])).toEqual(['c → a']);
    expect(findCircles([edge('a', 'b'), edge('a', 'c'), edge('b', 'd'), edge('c', 'd')])).toEqual([]);
  });

  it('refuses what the layout forbids', () => {
    expect(judgeImport('client/src/features/runs/a.ts', 'client/src/features/samples/b.ts')).toMatch(
      /never import each other/,
    );
    expect(judgeImport('server/analysis/a.ts', 'server/raster/b.ts')).toMatch(/may not import/);
    expect(judgeImport('shared/contracts/a.ts', 'server/errors.ts')).toMatch(/may not import/);
    expect(judgeImport('server/services/a.ts', 'server/routes/b.ts')).toMatch(/may not import/);
    expect(judgeImport('server/routes/a.ts', 'server/services/b.ts')).toBeNull();
  });
});
