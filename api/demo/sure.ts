/** The value, which must be there: the demo's own tables are complete, or the demo is wrong. */
export function sure<T>(value: T | undefined | null): T {
  if (value === undefined || value === null) throw new Error('The demo mill is not complete.');
  return value;
}
