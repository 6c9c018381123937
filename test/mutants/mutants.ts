import type { Mutant } from './mutant.js';
import { CHANCE, SETS_AND_AHEAD } from './of-chance.js';
import { ENTRIES } from './of-entries.js';
import { FIGURES } from './of-figures.js';

export const MUTANTS: readonly Mutant[] = [...FIGURES, ...ENTRIES, ...CHANCE, ...SETS_AND_AHEAD];
