import type { ValidatorFn } from '@angular/forms';
import { says } from './field';

/** A validator: no two of a kind are called alike, whatever the case of their letters. */
export function nameFree(others: () => readonly string[]): ValidatorFn {
  return says<string>((value) => {
    const name = value.trim();
    const taken = others().some((other) => other.trim().toLowerCase() === name.toLowerCase());
    return name !== '' && taken ? `There is one called ${name} already. Choose another name.` : '';
  });
}
