import type { IconName } from '../ui/icons';
import type { Permission, Role } from '@shared/contract/roles';

export interface NavigationItem {
  readonly path: string;
  readonly label: string;
  readonly icon: IconName;
}

interface Place extends NavigationItem {
  readonly needs: Permission;
  /** Only for these roles; absent: for whoever holds the permission. */
  readonly roles?: readonly Role[];
}

const PLACES: readonly Place[] = [
  {
    path: '/loomside',
    label: 'Loomside',
    icon: 'loomside',
    needs: 'entries.push',
    roles: ['weaver', 'tackler', 'foreman'],
  },
  { path: '/calls', label: 'Calls', icon: 'call', needs: 'calls.read', roles: ['tackler', 'foreman'] },
  { path: '/floor', label: 'Floor', icon: 'floor', needs: 'floor.read' },
  { path: '/shift-book', label: 'Shift book', icon: 'book', needs: 'sheet.read' },
  { path: '/weeks', label: 'Weeks', icon: 'weeks', needs: 'weeks.read' },
  // A manager's tablets are a room of set-up.
  { path: '/tablet', label: 'Tablets', icon: 'tablet', needs: 'devices.register', roles: ['foreman'] },
  { path: '/set-up', label: 'Set-up', icon: 'settings', needs: 'mill.manage' },
];

/** The screens a person can go to, in the order of the day. */
export function navigationFor(
  permissions: ReadonlySet<Permission>,
  roles: readonly Role[],
): readonly NavigationItem[] {
  return PLACES.filter(
    (place) =>
      permissions.has(place.needs) && (!place.roles || place.roles.some((role) => roles.includes(role))),
  );
}

/** Where a person's work is: the first screen after sign-in. */
export function landingFor(permissions: ReadonlySet<Permission>, roles: readonly Role[]): string {
  if (roles.includes('manager') && permissions.has('weeks.read')) return '/weeks';
  if (roles.includes('foreman') && permissions.has('floor.read')) return '/floor';
  if (roles.includes('tackler') && permissions.has('calls.read')) return '/calls';
  if (permissions.has('entries.push')) return '/loomside';
  return '/not-permitted';
}
