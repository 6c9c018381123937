/** The same list with what stood at `from` now standing at `to`. */
export function moved<T>(list: readonly T[], from: number, to: number): readonly T[] {
  const rest = list.filter((_, index) => index !== from);
  return [...rest.slice(0, to), ...list.slice(from, from + 1), ...rest.slice(to)];
}
