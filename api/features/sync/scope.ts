import type { DataSource } from 'typeorm';
import { ApiError } from '../../middleware/api-error.js';
import { maySeeShed, type Principal } from '../../middleware/principal.js';

/** What of the book a device sees: a shed, whole, or as the floor may (without other people's names on entries). */
export interface Scope {
  readonly of: 'floor' | 'shed';
  /** Null: the mill has no shed yet. */
  readonly shedId: string | null;
}

/** A tablet's shed is its own; an office browser names one, or gets the first that the person may see. */
export async function scopeOf(
  reads: DataSource,
  { person, device, permissions }: Principal,
  asked: string | undefined,
): Promise<Scope> {
  const of = person?.roles.some((role) => role === 'foreman' || role === 'manager') ? 'shed' : 'floor';
  const shedId = asked ?? device?.shedId ?? person?.shedIds[0] ?? (await firstShed(reads));
  const ownShed = shedId !== null && device?.shedId === shedId;
  if (shedId !== null && !ownShed && !maySeeShed({ person, device, permissions }, shedId))
    throw new ApiError('other-shed');
  return { of, shedId };
}

export function scopeName({ of, shedId }: Scope): string {
  return `${of}:${shedId ?? ''}`;
}

async function firstShed(reads: DataSource): Promise<string | null> {
  const [row] = await reads.query<{ id: string }[]>(`SELECT "id" FROM "shed" ORDER BY "id" LIMIT 1`);
  return row?.id ?? null;
}
