import type { Permission, Role } from '../../shared/contract/roles.js';

/** Who is asking, as read from the database for this very request. */
export interface Principal {
  readonly person: {
    readonly id: string;
    readonly roles: readonly Role[];
    /** Empty: all sheds. */
    readonly shedIds: readonly string[];
    readonly sessionId: string;
  } | null;
  readonly device: {
    readonly id: string;
    readonly kind: 'tablet' | 'browser';
    readonly shedId: string | null;
    readonly revoked: boolean;
  } | null;
  readonly permissions: ReadonlySet<Permission>;
}

/** Whether the person (or, with nobody signed in, the tablet) may see a shed. */
export function maySeeShed(principal: Principal, shedId: string): boolean {
  if (principal.person) {
    const { shedIds } = principal.person;
    return shedIds.length === 0 || shedIds.includes(shedId);
  }
  return principal.device?.shedId === shedId;
}
