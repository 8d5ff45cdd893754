const day = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'short', year: 'numeric' });
const clock = new Intl.DateTimeFormat('en-GB', { hour: '2-digit', minute: '2-digit' });
const calendarDay = new Intl.DateTimeFormat('en-GB', {
  day: 'numeric',
  month: 'short',
  year: 'numeric',
  timeZone: 'UTC',
});

type Instant = Date | string | number;

/** A moment's day where the reader is: "4 Sept 2025". @throws RangeError when it is no date */
export function formatDate(instant: Instant): string {
  return day.format(new Date(instant));
}

/** A moment with its time where the reader is: "4 Sept 2025, 14:07". @throws RangeError when it is no date */
export function formatDateTime(instant: Instant): string {
  return `${formatDate(instant)}, ${clock.format(new Date(instant))}`;
}

/** A date without a time (an acquisition date, "2025-09-04") that no time zone may move. */
export function formatCalendarDate(isoDate: string): string {
  return calendarDay.format(new Date(`${isoDate.slice(0, 10)}T00:00:00Z`));
}

/** How long ago, for lists of activity: "just now", "12 min ago", "14:07", "yesterday, 09:30", then the date. */
export function formatSince(instant: Instant, now: Instant = Date.now()): string {
  const then = new Date(instant);
  const today = new Date(now);
  const seconds = (today.getTime() - then.getTime()) / 1000;
  if (seconds < 60) return 'just now';
  if (seconds < 3600) return `${Math.floor(seconds / 60)}\u202Fmin ago`;
  if (then.toDateString() === today.toDateString()) return clock.format(then);
  const yesterday = new Date(today);
  yesterday.setDate(today.getDate() - 1);
  if (then.toDateString() === yesterday.toDateString()) return `yesterday, ${clock.format(then)}`;
  return formatDateTime(then);
}
