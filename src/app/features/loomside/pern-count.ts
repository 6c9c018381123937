import { LIMITS } from '@shared/contract/limits';
import { formatCount } from '@shared/figures/format';

/** Perns are kept in baskets of a gross. */
export const BASKET = 144;
/** More on one loom in one shift is asked about. */
const MOST_LIKELY = 20 * BASKET;

export interface PernCount {
  /** Null: not to be known from what was typed. */
  readonly total: number | null;
  /** Why not; empty: it is known. */
  readonly complaint: string;
  /** The question to ask; empty: nothing odd. */
  readonly question: string;
}

/** Whole baskets and odd perns as typed, in all. An empty field means none; nothing else is made into a number. */
export function countPerns(baskets: string, odd: string): PernCount {
  const complaint = complaintAbout(baskets, 'baskets') || complaintAbout(odd, 'perns');
  if (complaint) return { total: null, complaint, question: '' };
  const total = Number(baskets.trim()) * BASKET + Number(odd.trim());
  if (total > LIMITS.count)
    return {
      total: null,
      complaint: `One count takes ${formatCount(LIMITS.count)} perns at most, and this is more. Count again.`,
      question: '',
    };
  return {
    total,
    complaint: '',
    question:
      total > MOST_LIKELY
        ? `${formatCount(total)} perns are more than ${MOST_LIKELY / BASKET} baskets, on one loom in one shift. Count again, or keep it.`
        : '',
  };
}

/** The number that stands there, one step on; never below none. */
export function stepped(text: string, by: number): string {
  const now = complaintAbout(text, 'perns') ? 0 : Number(text.trim());
  return String(Math.max(0, now + by));
}

function complaintAbout(text: string, what: 'baskets' | 'perns'): string {
  const said = text.trim();
  if (/^\d*$/.test(said)) return '';
  if (/^[-−]\d/.test(said)) return `There are no fewer ${what} than none. Type how many there are.`;
  if (/^\d*[.,]\d*$/.test(said))
    return what === 'baskets'
      ? 'Whole baskets alone: what is in a part-full basket belongs to the odd ones.'
      : 'Whole perns alone: type a number without point or comma.';
  return `“${said.slice(0, 20)}” is not a number of ${what}. Type digits alone.`;
}

/**
 * Perns of a set, shared out to its looms by their picks, whole ones: the largest remainders get what is left. Where a
 * loom's picks are not known, all get alike.
 *
 * @param picks of each loom in the shift; null: not known
 */
export function sharePerns(total: number, picks: readonly (number | null)[]): number[] {
  const known = picks.every((one) => one !== null && one > 0);
  const weights = picks.map((one) => (known ? (one ?? 0) : 1));
  const all = weights.reduce((sum, one) => sum + one, 0);
  const exact = weights.map((one) => (total * one) / all);
  const shares = exact.map(Math.floor);
  const left = total - shares.reduce((sum, one) => sum + one, 0);
  const remainder = (i: number) => (exact[i] ?? 0) - (shares[i] ?? 0);
  const next = shares.map((_, i) => i).sort((a, b) => remainder(b) - remainder(a) || a - b);
  for (const i of next.slice(0, left)) shares[i] = (shares[i] ?? 0) + 1;
  return shares;
}
