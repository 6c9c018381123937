/** A record's own value: a cause may be called "constructor", which every object has. */
export function ownValue<V>(record: Readonly<Record<string, V>>, key: string): V | undefined {
  return Object.hasOwn(record, key) ? record[key] : undefined;
}
