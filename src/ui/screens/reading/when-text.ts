/** Date and time where the reading was taken, in the reader's language. */
export function whenText(isoTime: string, timeZone?: string): string {
  const time = new Date(isoTime);
  if (Number.isNaN(time.getTime())) return isoTime;
  const options = { dateStyle: 'medium', timeStyle: 'short' } as const;
  try {
    return new Intl.DateTimeFormat(undefined, { ...options, ...(timeZone ? { timeZone } : {}) }).format(time);
  } catch {
    // a time zone this browser does not know
    return new Intl.DateTimeFormat(undefined, options).format(time);
  }
}
