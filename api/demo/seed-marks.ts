/** In a demo's book since its mill was planted; its value is the moment (ms since 1970). */
export const SEEDED_AT = 'demo-seeded-at';
/** In a demo's book since all its entries are there. */
export const SEEDED_WHOLE = 'demo-whole';
