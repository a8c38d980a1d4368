const day = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'short' });
const dayOfYear = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'short', year: 'numeric' });
const weekday = new Intl.DateTimeFormat('en-GB', { weekday: 'long', day: 'numeric', month: 'long' });
const clock = new Intl.DateTimeFormat('en-GB', { hour: '2-digit', minute: '2-digit' });

/** "14:02" today, "30 Nov 16:12" this year, "30 Nov 2025" before; local time. */
export function printTime(iso: string, now = new Date()): string {
  const at = new Date(iso);
  if (at.toDateString() === now.toDateString()) return `today ${clock.format(at)}`;
  if (at.getFullYear() === now.getFullYear()) return `${day.format(at)} ${clock.format(at)}`;
  return dayOfYear.format(at);
}

/** "30 Nov 2026, 16:12": for records. */
export function printExactTime(iso: string): string {
  const at = new Date(iso);
  return `${dayOfYear.format(at)}, ${clock.format(at)}`;
}

/** "Tuesday 1 December, 08:40" */
export function printNow(now: Date): string {
  return `${weekday.format(now)}, ${clock.format(now)}`;
}
