const day = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'short' });
const dayYear = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'long', year: 'numeric' });
const time = new Intl.DateTimeFormat('en-GB', { hour: '2-digit', minute: '2-digit' });

const sameDay = (a: Date, b: Date) => a.toDateString() === b.toDateString();

/** "14:06". */
export const clock = (iso: string): string => time.format(new Date(iso));

/** "28 Nov". */
export const shortDay = (iso: string): string => day.format(new Date(iso));

/** "24 November 2026". */
export const longDay = (iso: string): string => dayYear.format(new Date(iso));

/** "now", "12 min ago", "today, 11:20", "yesterday", "28 Nov", "28 November 2025". */
export function howLongAgo(iso: string, now = new Date()): string {
  const then = new Date(iso);
  const minutes = Math.floor((now.getTime() - then.getTime()) / 60_000);
  if (minutes < 1) return 'now';
  if (minutes < 60) return `${minutes} min ago`;
  if (sameDay(then, now)) return `today, ${time.format(then)}`;
  if (sameDay(then, new Date(now.getTime() - 86_400_000))) return 'yesterday';
  return then.getFullYear() === now.getFullYear() ? day.format(then) : dayYear.format(then);
}

/** "1 cell", "3 cells". */
export const counted = (count: number, one: string, many = `${one}s`): string =>
  `${count} ${count === 1 ? one : many}`;
