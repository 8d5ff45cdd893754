const OLDEST_DAY = '1972-01-01';
/** yyyymmdd, yyyy-mm-dd or yyyy_mm_dd that is no part of a longer figure. */
const DAY_PATTERN = /(?<!\d)(\d{4})([-_.]?)(\d{2})\2(\d{2})(?!\d)/g;

/**
 * The day all file names agree on, as yyyy-mm-dd; null when none, or more than one, is named. Only year-first days are
 * read, since 03-04-2025 means two days.
 *
 * @param today the latest day that can be meant, yyyy-mm-dd
 */
export function readAcquisitionDay(fileNames: readonly string[], today: string): string | null {
  const days = new Set(fileNames.flatMap((name) => daysIn(name, today)));
  return days.size === 1 ? ([...days][0] ?? null) : null;
}

/** Every day the names carry, in order; more than one means that the files may be of several scenes. */
export function namedDays(fileNames: readonly string[], today: string): string[] {
  return [...new Set(fileNames.flatMap((name) => daysIn(name, today)))].sort();
}

function daysIn(name: string, today: string): string[] {
  return [...name.matchAll(DAY_PATTERN)]
    .map(([, year, , month, day]) => `${year}-${month}-${day}`)
    .filter((iso) => isRealDay(iso) && iso >= OLDEST_DAY && iso <= today);
}

function isRealDay(iso: string): boolean {
  const time = Date.parse(`${iso}T00:00:00Z`);
  return !Number.isNaN(time) && new Date(time).toISOString().slice(0, 10) === iso;
}

/** A scene's name out of its files': one file's stem, or what all stems begin with. Cut to the contract's 160 letters. */
export function suggestSceneName(fileNames: readonly string[]): string {
  const stems = fileNames.map((name) => name.replace(/\.[^.]*$/, ''));
  const [first = ''] = stems;
  let length = first.length;
  for (const stem of stems) {
    while (!stem.startsWith(first.slice(0, length))) length -= 1;
  }
  const common = first.slice(0, length).replace(/[\s_.-]+$/, '');
  return (stems.length > 1 && common.length < 3 ? first : common).slice(0, 160);
}
