/** A moment as people write it: time alone today, day and time otherwise. */
export function dayAndTime(iso: string, now = new Date()): string {
  const moment = new Date(iso);
  const time = moment.toLocaleTimeString(undefined, { hour: '2-digit', minute: '2-digit' });
  if (moment.toDateString() === now.toDateString()) return time;
  const isThisYear = moment.getFullYear() === now.getFullYear();
  const day = moment.toLocaleDateString(undefined, {
    day: 'numeric',
    month: 'short',
    ...(isThisYear ? {} : { year: 'numeric' }),
  });
  return `${day}, ${time}`;
}
