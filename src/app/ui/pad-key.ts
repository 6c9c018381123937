/** What a keyboard says to a number pad. */
export type PadKey =
  { readonly key: 'digit'; readonly digit: string } | { readonly key: 'erase' } | { readonly key: 'done' };

/**
 * Reads a key pressed anywhere on the page, so that typing works wherever the focus fell. Null: the key is another's,
 * as in a field, or Enter on a button.
 */
export function padKeyOf(event: KeyboardEvent): PadKey | null {
  if (event.defaultPrevented || event.ctrlKey || event.metaKey || event.altKey) return null;
  const target = event.target instanceof Element ? event.target : null;
  if (target?.closest('input, textarea, select, [contenteditable]')) return null;
  if (/^\d$/.test(event.key)) return { key: 'digit', digit: event.key };
  if (event.key === 'Backspace') return { key: 'erase' };
  if (event.key === 'Enter' && !target?.closest('button, a, summary, [role=menuitem]'))
    return { key: 'done' };
  return null;
}
