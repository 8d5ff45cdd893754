import { describe, expect, it } from 'vitest';
import { formatCoordinates, formatLongitude } from '../../../client/src/lib/format-coordinates.ts';
import { formatCalendarDate, formatSince } from '../../../client/src/lib/format-date.ts';
import {
  THIN_SPACE as T,
  formatBytes,
  formatCount,
  formatDuration,
  formatHectares,
  formatMeters,
  formatNumber,
  formatPercent,
  formatPlusMinus,
  formatTimeLeft,
} from '../../../client/src/lib/format.ts';

describe('numbers', () => {
  it.each([
    [0, 0, '0'],
    [999, 0, '999'],
    [24310, 0, `24${T}310`],
    [1234567.891, 2, `1${T}234${T}567.89`],
    [-0.004, 2, '0.00'],
    [-12.5, 1, '−12.5'],
  ])('prints %d with %d decimals as %s', (value, decimals, expected) => {
    expect(formatNumber(value, decimals)).toBe(expected);
  });

  it.each([null, undefined, NaN, Infinity])('prints %s as a dash, never as a figure', (value) => {
    expect(formatNumber(value)).toBe('–');
    expect(formatHectares(value)).toBe('–');
    expect(formatPercent(value)).toBe('–');
    expect(formatPlusMinus(value, 1)).toBe('–');
  });

  it('says areas with the decimals their size bears', () => {
    expect(formatHectares(3.69)).toBe(`3.69${T}ha`);
    expect(formatHectares(41.25)).toBe(`41.3${T}ha`);
    expect(formatHectares(24310.4)).toBe(`24${T}310${T}ha`);
  });

  it('says shares, intervals, counts, lengths and sizes', () => {
    expect(formatPercent(0.912)).toBe(`91${T}%`);
    expect(formatPlusMinus(0.912, 0.021, 3)).toBe('0.912 ± 0.021');
    expect(formatPlusMinus(0.912, null, 3)).toBe('0.912');
    expect(formatCount(1, 'sample')).toBe('1\u00A0sample');
    expect(formatCount(2, 'class', 'classes')).toBe('2\u00A0classes');
    expect(formatMeters(410)).toBe(`410${T}m`);
    expect(formatMeters(36000)).toBe(`36${T}km`);
    expect(formatBytes(1_530_000)).toBe(`1.5${T}MB`);
    expect(formatBytes(999_600)).toBe(`1.0${T}MB`);
  });
});

describe('times', () => {
  it.each([
    [7, `7${T}s`],
    [75, `1${T}min 15${T}s`],
    [4020, `1${T}h 7${T}min`],
    [7200, `2${T}h`],
    [3599.7, `1${T}h`],
    [90000, `1${T}d 1${T}h`],
  ])('prints %d seconds as %s', (seconds, expected) => {
    expect(formatDuration(seconds)).toBe(expected);
  });

  it('rounds the time left up, and says nothing when it is not known', () => {
    expect(formatTimeLeft(4)).toBe('a few seconds left');
    expect(formatTimeLeft(96)).toBe(`about 2${T}min left`);
    expect(formatTimeLeft(null)).toBe('');
  });

  it('lets no time zone move an acquisition date', () => {
    expect(formatCalendarDate('2025-01-01')).toBe('1 Jan 2025');
  });

  it('says how long ago something was', () => {
    const now = new Date(2025, 8, 4, 14, 30);
    expect(formatSince(new Date(2025, 8, 4, 14, 29, 30), now)).toBe('just now');
    expect(formatSince(new Date(2025, 8, 4, 14, 18), now)).toBe('12\u202Fmin ago');
    expect(formatSince(new Date(2025, 8, 4, 9, 5), now)).toBe('09:05');
    expect(formatSince(new Date(2025, 8, 3, 9, 5), now)).toBe('yesterday, 09:05');
  });
});

describe('coordinates', () => {
  it('are latitude first, with their hemisphere', () => {
    expect(formatCoordinates(59.4127, -16.431)).toBe('59.4127°\u00A0N 16.4310°\u00A0W');
    expect(formatCoordinates(-1, 2, 1)).toBe('1.0°\u00A0S 2.0°\u00A0E');
  });

  it('wrap round the date line', () => {
    expect(formatLongitude(190, 0)).toBe('170°\u00A0W');
  });
});
