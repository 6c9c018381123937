/**
 * Roles and permissions as data. A route names the permission it needs where it is mounted; an entry kind names
 * the roles that may log it. Nothing else decides who may do what.
 */
export const ROLES = ['weaver', 'tackler', 'foreman', 'manager'] as const;
export type Role = (typeof ROLES)[number];

export const PERMISSIONS = [
  /** Open to everybody, signed in or not. */
  'public',
  /** Signed in as a person, whatever the role. */
  'self',
  'entries.push',
  /** Entries from a file that another device exported. */
  'entries.bring-in',
  'changes.read',
  /** The shed as it stands. A screen's permission: what it shows comes by `changes.read`. */
  'floor.read',
  /** Who calls for the tackler, a loom's repairs with their photos, beams and jobs that come due. */
  'calls.read',
  'sheet.read',
  'weeks.read',
  'people.read',
  'people.manage',
  'devices.register',
  'devices.manage',
  /** Set-up, its commands, mail and the change record. */
  'mill.manage',
] as const;
export type Permission = (typeof PERMISSIONS)[number];

/** What a role brings. A person with several roles has the union. */
export const ROLE_PERMISSIONS: Readonly<Record<Role, readonly Permission[]>> = {
  weaver: ['public', 'self', 'entries.push', 'changes.read'],
  tackler: ['public', 'self', 'entries.push', 'changes.read', 'floor.read', 'calls.read'],
  foreman: [
    'public',
    'self',
    'entries.push',
    'entries.bring-in',
    'changes.read',
    'floor.read',
    'calls.read',
    'sheet.read',
    'weeks.read',
    'people.read',
    'devices.register',
  ],
  manager: [
    'public',
    'self',
    'entries.push',
    'entries.bring-in',
    'changes.read',
    'floor.read',
    'calls.read',
    'sheet.read',
    'weeks.read',
    'people.read',
    'people.manage',
    'devices.register',
    'devices.manage',
    'mill.manage',
  ],
};

/** A registered tablet may sync with nobody signed in; a revoked one may only hand in what it holds. */
export const DEVICE_PERMISSIONS: Readonly<Record<'active' | 'revoked', readonly Permission[]>> = {
  active: ['public', 'entries.push', 'changes.read'],
  revoked: ['public', 'entries.push'],
};

/** The permissions that several roles together bring. */
export function permissionsOf(roles: readonly Role[]): ReadonlySet<Permission> {
  return new Set(roles.flatMap((role) => ROLE_PERMISSIONS[role]));
}
