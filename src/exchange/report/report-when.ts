/** Day and time of an instant as people there would write it, with the zone's name. */
export function whenText(iso: string, timeZone: string): string {
  const at = new Date(iso);
  if (Number.isNaN(at.getTime())) return iso;
  const options = { dateStyle: 'long', timeStyle: 'short' } as const;
  try {
    return `${new Intl.DateTimeFormat('en-GB', { ...options, timeZone }).format(at)} (${timeZone})`;
  } catch {
    // A zone of another phone that this browser does not know.
    return `${new Intl.DateTimeFormat('en-GB', { ...options, timeZone: 'UTC' }).format(at)} (UTC)`;
  }
}
