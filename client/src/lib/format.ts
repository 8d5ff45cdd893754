/** Thin, unbreaking space: between thousands, and between a figure and its unit. */
export const THIN_SPACE = '\u202F';
const MINUS = '\u2212';
const NOTHING = '–';

/** A number with thin-spaced thousands and a real minus: 24310 → "24 310". Not-a-number and null print "–". */
export function formatNumber(value: number | null | undefined, decimals = 0): string {
  if (value === null || value === undefined || !Number.isFinite(value)) return NOTHING;
  const [whole = '', fraction] = Math.abs(value).toFixed(decimals).split('.');
  const grouped = whole.replace(/\B(?=(\d{3})+(?!\d))/g, THIN_SPACE);
  const digits = fraction ? `${grouped}.${fraction}` : grouped;
  const isZero = Number(digits.replaceAll(THIN_SPACE, '')) === 0;
  return value < 0 && !isZero ? `${MINUS}${digits}` : digits;
}

/** An area in hectares: two decimals under 10 ha, one under 100, none above. */
export function formatHectares(areaHa: number | null | undefined): string {
  if (areaHa === null || areaHa === undefined || !Number.isFinite(areaHa)) return NOTHING;
  return `${formatNumber(areaHa, decimalsForSize(areaHa))}${THIN_SPACE}ha`;
}

function decimalsForSize(value: number): number {
  const size = Math.abs(value);
  if (size < 10) return 2;
  return size < 100 ? 1 : 0;
}

/** A share 0–1 as a percentage: 0.912 → "91 %". */
export function formatPercent(share: number | null | undefined, decimals = 0): string {
  if (share === null || share === undefined || !Number.isFinite(share)) return NOTHING;
  return `${formatNumber(share * 100, decimals)}${THIN_SPACE}%`;
}

/** A value and its half-interval: "0.912 ± 0.021". Without a half-interval, the value alone. */
export function formatPlusMinus(
  value: number | null | undefined,
  halfWidth: number | null | undefined,
  decimals = 0,
): string {
  const figure = formatNumber(value, decimals);
  if (figure === NOTHING || halfWidth === null || halfWidth === undefined || !Number.isFinite(halfWidth)) return figure;
  return `${figure} ± ${formatNumber(halfWidth, decimals)}`;
}

/** A count with its noun: 1 → "1 sample", 248 → "248 samples"; give the plural when it is not noun + s. */
export function formatCount(count: number, noun: string, plural = `${noun}s`): string {
  return `${formatNumber(count)}${'\u00A0'}${count === 1 ? noun : plural}`;
}

/** A length in metres, in kilometres from 10 000 m: 410 → "410 m", 36000 → "36 km". */
export function formatMeters(lengthMeters: number | null | undefined): string {
  if (lengthMeters === null || lengthMeters === undefined || !Number.isFinite(lengthMeters)) return NOTHING;
  if (Math.abs(lengthMeters) >= 10_000) return `${formatNumber(lengthMeters / 1000)}${THIN_SPACE}km`;
  return `${formatNumber(lengthMeters)}${THIN_SPACE}m`;
}

/** A file's size in the decimal units file managers print: 1530000 → "1.5 MB". */
export function formatBytes(nBytes: number | null | undefined): string {
  if (nBytes === null || nBytes === undefined || !Number.isFinite(nBytes)) return NOTHING;
  const units = ['bytes', 'kB', 'MB', 'GB', 'TB'];
  let value = nBytes;
  let step = 0;
  while (Math.abs(value) >= 999.5 && step < units.length - 1) {
    value /= 1000;
    step += 1;
  }
  const decimals = step > 0 && Math.abs(value) < 10 ? 1 : 0;
  return `${formatNumber(value, decimals)}${THIN_SPACE}${units[step]}`;
}

/** A span of time in its two largest units: 75 → "1 min 15 s", 4000 → "1 h 7 min". */
export function formatDuration(seconds: number | null | undefined): string {
  if (seconds === null || seconds === undefined || !Number.isFinite(seconds)) return NOTHING;
  const total = Math.max(0, Math.round(seconds));
  if (total < 60) return `${total}${THIN_SPACE}s`;
  if (total < 3600) return joinUnits(Math.floor(total / 60), 'min', total % 60, 's');
  const minutes = Math.round(total / 60);
  if (minutes < 1440) return joinUnits(Math.floor(minutes / 60), 'h', minutes % 60, 'min');
  const hours = Math.round(total / 3600);
  return joinUnits(Math.floor(hours / 24), 'd', hours % 24, 'h');
}

function joinUnits(big: number, bigUnit: string, small: number, smallUnit: string): string {
  const first = `${formatNumber(big)}${THIN_SPACE}${bigUnit}`;
  return small === 0 ? first : `${first} ${small}${THIN_SPACE}${smallUnit}`;
}

/** Time left as people say it: "about 2 min left", "a few seconds left"; null prints nothing. */
export function formatTimeLeft(seconds: number | null | undefined): string {
  if (seconds === null || seconds === undefined || !Number.isFinite(seconds)) return '';
  if (seconds < 10) return 'a few seconds left';
  if (seconds < 60) return `about ${Math.ceil(seconds / 10) * 10}${THIN_SPACE}s left`;
  const rounded = seconds < 600 ? Math.ceil(seconds / 60) * 60 : Math.ceil(seconds / 300) * 300;
  return `about ${formatDuration(rounded)} left`;
}
