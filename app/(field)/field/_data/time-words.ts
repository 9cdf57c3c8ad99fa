const clock = new Intl.DateTimeFormat(undefined, { hour: '2-digit', minute: '2-digit', hourCycle: 'h23' });
const day = new Intl.DateTimeFormat(undefined, { day: 'numeric', month: 'short', year: 'numeric' });

/** "14:05" today, "14 Sep 2026, 14:05" on another day; in the phone's own time. */
export function timeWords(iso: string, now: Date = new Date()): string {
  const time = new Date(iso);
  return time.toDateString() === now.toDateString() ? clock.format(time) : `${day.format(time)}, ${clock.format(time)}`;
}

/** "today 14:05" or "14 Sep 2026". */
export function dayWords(iso: string, now: Date = new Date()): string {
  const time = new Date(iso);
  return time.toDateString() === now.toDateString() ? `today ${clock.format(time)}` : day.format(time);
}
