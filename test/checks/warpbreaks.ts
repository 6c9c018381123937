/**
 * Breaks per loom for a fixed length of yarn, 54 looms. L. H. C. Tippett, Technological Applications of
 * Statistics, 1950, p. 106; R `datasets::warpbreaks`. By wool (A, B) and tension (low, medium, high).
 */
export const WARPBREAKS: Readonly<Record<'AL' | 'AM' | 'AH' | 'BL' | 'BM' | 'BH', readonly number[]>> = {
  AL: [26, 30, 54, 25, 70, 52, 51, 26, 67],
  AM: [18, 21, 29, 17, 12, 18, 35, 30, 36],
  AH: [36, 21, 24, 18, 10, 43, 28, 15, 26],
  BL: [27, 14, 29, 19, 29, 31, 41, 20, 44],
  BM: [42, 26, 19, 16, 39, 28, 21, 39, 29],
  BH: [20, 21, 24, 17, 13, 15, 15, 16, 28],
};

/** All 54 in the order AL, AM, AH, BL, BM, BH. */
export const ALL_WARPBREAKS: readonly number[] = Object.values(WARPBREAKS).flat();
