import type { RecipeDifference } from '../../shared/contracts/named-recipe.ts';

/** What settings are called in plain words; one that is missing here is named by its own key. */
const LABELS: Record<string, string> = {
  sceneId: 'Scene',
  bandIds: 'Bands',
  classIds: 'Classes',
  heldOutShare: 'Held out of each class’s polygons',
  sampleStates: 'Review states used',
  seed: 'Seed',
  maxPixelsPerClass: 'Most training pixels a class',
  minShare: 'Unclassified below a share of',
  'classifier.kind': 'Classifier',
  'classifier.trees': 'Trees',
  'classifier.maxDepth': 'Deepest level',
  'classifier.minLeaf': 'Smallest leaf, pixels',
  'classifier.featuresPerTree': 'Features drawn for a split or tree',
  'classifier.classWeights': 'Class weights',
  'classifier.neighbours': 'Neighbours',
  'classifier.standardise': 'Features on one scale',
  'classifier.priors': 'Priors',
  'classifier.ridge': 'Ridge',
  'classifier.metric': 'Distance',
  postProcessing: 'Post-processing',
};

/** Values of settings in plain words, where the value itself is none. */
const WORDS: Record<string, string> = {
  'random-forest': 'random forest',
  'random-subspace-forest': 'random-subspace forest',
  'nearest-neighbours': 'k-nearest neighbours',
  'gaussian-maximum-likelihood': 'Gaussian maximum likelihood',
  'minimum-distance': 'minimum distance',
};

/** Settings that are shares of one and read better in percent. */
const SHARES = new Set(['heldOutShare', 'minShare', 'classifier.ridge']);

type Leaf = string | number | boolean | null;

/**
 * What sets two recipes apart, setting by setting, in the order of the first. It knows no recipe's shape: any JSON will do, and a
 * setting added to recipes shows by itself. Lists of plain values are compared as a whole.
 * @param nameOf the name of a scene, band, class or person by its id; null where it is none or gone
 */
export function diffRecipes(
  left: object,
  right: object,
  nameOf: (id: string) => string | null = () => null,
): RecipeDifference[] {
  const a = flatten(left);
  const b = flatten(right);
  const paths = [...a.keys(), ...[...b.keys()].filter((path) => !a.has(path))];
  const differences: RecipeDifference[] = [];
  for (const path of paths) {
    const [one, other] = [a.get(path), b.get(path)];
    if (JSON.stringify(one) === JSON.stringify(other)) continue;
    differences.push({
      path,
      label: labelOf(path),
      left: one === undefined ? null : sayValue(path, one, nameOf),
      right: other === undefined ? null : sayValue(path, other, nameOf),
    });
  }
  return differences;
}

function isLeaf(value: unknown): value is Leaf {
  return value === null || typeof value !== 'object';
}

/** Every setting by its dotted path; members of a list of objects by their number from 1. */
function flatten(value: object, prefix = ''): Map<string, Leaf | Leaf[]> {
  const flat = new Map<string, Leaf | Leaf[]>();
  const entries: [string, unknown][] = Array.isArray(value)
    ? (value as unknown[]).map((member, i) => [String(i + 1), member])
    : Object.entries(value);
  for (const [key, member] of entries) {
    const path = prefix ? `${prefix}.${key}` : key;
    if (member === undefined) continue;
    if (isLeaf(member)) flat.set(path, member);
    else if (Array.isArray(member) && (member as unknown[]).every(isLeaf)) flat.set(path, member as Leaf[]);
    else for (const [inner, leaf] of flatten(member as object, path)) flat.set(inner, leaf);
  }
  return flat;
}

function labelOf(path: string): string {
  const known = LABELS[path];
  if (known) return known;
  const parts = path.split('.');
  const numbered = parts.slice(0, -1).findLast((part) => /^\d+$/.test(part));
  const [last = path] = parts.slice(-1);
  const isNumber = /^\d+$/.test(last);
  const key = isNumber ? (parts.at(-2) ?? last) : last;
  const words = sayWords(key.replace(/Ids?$/, ''));
  const number = isNumber ? last : numbered;
  const parent = parts.length > 1 && !isNumber ? parts.filter((part) => !/^\d+$/.test(part)).at(-2) : undefined;
  const group = parent && parent !== 'classifier' ? `${LABELS[parent] ?? capitalise(sayWords(parent))}, ` : '';
  return `${group}${group ? words : capitalise(words)}${number ? ` ${number}` : ''}`;
}

/** "maxPixelsPerClass" as "max pixels per class". */
function sayWords(key: string): string {
  return key
    .replace(/([a-z\d])([A-Z])/g, (_all, before: string, after: string) => `${before} ${after.toLowerCase()}`)
    .replace(/-/g, ' ');
}

function capitalise(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}

function sayValue(path: string, value: Leaf | Leaf[], nameOf: (id: string) => string | null): string {
  if (Array.isArray(value)) {
    return value.length === 0 ? 'none' : value.map((one) => sayValue(path, one, nameOf)).join(', ');
  }
  if (value === null) return 'automatic';
  if (typeof value === 'boolean') return value ? 'yes' : 'no';
  if (typeof value === 'number') {
    return SHARES.has(path) || /share$/i.test(path) ? `${Number((value * 100).toFixed(2))} %` : String(value);
  }
  if (value === '') return 'empty';
  return nameOf(value) ?? WORDS[value] ?? (isId(value) ? 'one that is gone' : value);
}

function isId(text: string): boolean {
  return /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/i.test(text);
}
