/** A cause's name within a sentence: "weft fork"; what begins with two capitals stays as it is. */
export function lower(name: string): string {
  return /^\p{Lu}{2}/u.test(name) ? name : name.charAt(0).toLocaleLowerCase('en-GB') + name.slice(1);
}
