import type { Job, Part } from '../../shared/contract/reference.js';

/** Spare parts on the demo mill's list, in the words of its tacklers. */
export const DEMO_PARTS: readonly Part[] = [
  ['picking-band', 'Picking band'],
  ['picker', 'Picker'],
  ['shuttle', 'Shuttle'],
  ['temple-roller', 'Temple roller'],
  ['heald', 'Heald'],
  ['motor-brush', 'Motor brush'],
  ['swell-spring', 'Swell spring'],
].map(([id = '', name = '']) => ({ id, name, retired: false }));

/** Jobs of care. A loom weaves some 200,000 picks in a day of two shifts. */
export const DEMO_JOBS: readonly Job[] = [
  { id: 'oil', name: 'Oil the loom', everyPicks: 14_000_000, retired: false },
  { id: 'picking-bands', name: 'Look at the picking bands', everyPicks: 13_000_000, retired: false },
  { id: 'clean', name: 'Clean under the loom', everyPicks: 16_000_000, retired: false },
];

export function demoPartId(name: string): string | undefined {
  return DEMO_PARTS.find((part) => part.name === name)?.id;
}
