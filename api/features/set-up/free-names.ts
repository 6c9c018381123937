import { wrongField } from '../../middleware/api-error.js';

/** Throws where another thing of a kind has the name; capitals make no difference, people do not hear them. */
export function requireFreeName(
  others: readonly { readonly id: string; readonly name: string }[],
  name: string,
  own: string | null,
  path: string,
  what: string,
): void {
  const same = others.find((one) => one.id !== own && one.name.toLowerCase() === name.toLowerCase());
  if (same)
    throw wrongField(path, `Another ${what} is called ${same.name}. Choose a name that tells them apart.`);
}
