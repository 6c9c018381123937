/** IANA names this browser knows. UTC is a time zone too, though the list leaves it out. */
export function timeZones(): readonly string[] {
  return [...new Set([...Intl.supportedValuesOf('timeZone'), 'UTC', ownTimeZone()])].sort();
}

export function ownTimeZone(): string {
  return Intl.DateTimeFormat().resolvedOptions().timeZone;
}
