import type { Accuracy, AccuracyUnit } from '../../../../shared/contracts/accuracy.ts';

/** A sentence in three pieces, with the figure it turns on in the middle. */
export interface AccuracyStatement {
  before: string;
  figure: string;
  after: string;
  /** The weakest class, when one stands out. */
  weak: string | null;
}

export const UNIT_NOUN: Record<AccuracyUnit, { one: string; many: string }> = {
  pixel: { one: 'pixel', many: 'pixels' },
  polygon: { one: 'polygon', many: 'polygons' },
};

/** The page's sentence: how many held-out units carry the right class, give or take what, and where the map is weak. */
export function describeAccuracy(accuracy: Accuracy): AccuracyStatement {
  const { overall, unit } = accuracy;
  const { many } = UNIT_NOUN[unit];
  if (overall.value === null) {
    return {
      before: 'How well the map agrees is ',
      figure: 'undefined',
      after: `: none of the held-out ${many} lies in the map.`,
      weak: null,
    };
  }
  return {
    before: `Of the held-out ${many}, `,
    figure: `${inHundred(overall.value)} in 100`,
    after: ` ${overall.value === 0.01 ? 'carries' : 'carry'} the right class${describeInterval(overall)}.`,
    weak: describeWeakClass(accuracy),
  };
}

/** A share as so many in 100; what is not all or nothing never rounds to it. */
export function inHundred(share: number): string {
  const whole = Math.round(share * 100);
  if (whole === 100 && share < 1) return (Math.floor(share * 1000) / 10).toFixed(1);
  if (whole === 0 && share > 0) return (Math.ceil(share * 1000) / 10).toFixed(1);
  return String(whole);
}

/** Both sides of an interval may differ by this much (in hundredths) and still be told as "give or take". */
const LOPSIDED_FROM = 1;

function describeInterval({ value, low, high }: Accuracy['overall']): string {
  if (value === null) return '';
  if (low === null || high === null) return '; too few polygons for an interval';
  const below = (value - low) * 100;
  const above = (high - value) * 100;
  if (Math.abs(below - above) >= LOPSIDED_FROM) {
    return `, somewhere between ${inHundred(low)} and ${inHundred(high)}`;
  }
  const half = Math.round((below + above) / 2);
  return half === 0 ? ', give or take less than 1' : `, give or take ${half}`;
}

/** Below this user's accuracy a class is worth a word of its own. */
const WEAK_BELOW = 0.9;
/** Rule of thumb for accuracy samples: Congalton 1991, Remote Sensing of Environment 37:35–46. */
const ENOUGH_MAPPED = 50;

function describeWeakClass({ classes, matrix, perClass, unit }: Accuracy): string | null {
  // A class with too little behind it may only look weak: it is said to be unsure, not weak.
  const rows = perClass.flatMap(({ users, warning, mappedCount }, index) =>
    users.value === null || warning !== null || mappedCount < ENOUGH_MAPPED ? [] : [{ index, users: users.value }],
  );
  const weakest = rows.toSorted((a, b) => a.users - b.users)[0];
  if (!weakest || weakest.users >= WEAK_BELOW) return null;
  const row = matrix[weakest.index] ?? [];
  const mapped = row.reduce((sum, count) => sum + count, 0);
  const [other] = row
    .map((count, reference) => ({ count, reference }))
    .filter(({ count, reference }) => reference !== weakest.index && count > 0)
    .toSorted((a, b) => b.count - a.count);
  const name = classes[weakest.index]?.name;
  const otherName = other && classes[other.reference]?.name;
  if (!name || !other || !otherName) return null;
  const { one } = UNIT_NOUN[unit];
  return `${name} is the weak class: ${oneIn(other.count, mapped, one)} mapped as ${lower(name)} ${other.count * 2 > mapped ? 'are' : 'is'} really ${lower(otherName)}.`;
}

/** 15 of 100 → "about 1 pixel in 7". */
function oneIn(count: number, total: number, noun: string): string {
  const every = Math.round(total / count);
  if (count * 2 > total) return `most ${noun}s`;
  return `about 1 ${noun} in ${every}`;
}

/** A class name inside a sentence: only a plain capital at the front is lowered, not an abbreviation's. */
function lower(name: string): string {
  return /^\p{Lu}\p{Ll}/u.test(name) ? name.charAt(0).toLowerCase() + name.slice(1) : name;
}
