import type { Permission } from '../../shared/contract/roles.js';

/** Who asks, and what is said to them where they may not. */
export const REFUSALS = {
  nobody: 'not-signed-in',
  tablet: 'not-signed-in',
  weaver: 'not-permitted',
  tackler: 'not-permitted',
  foreman: 'not-permitted',
  manager: 'not-permitted',
  revokedTablet: 'device-revoked',
  disabledPerson: 'session-ended',
} as const;
export type Actor = keyof typeof REFUSALS;
export const ACTORS = Object.keys(REFUSALS) as Actor[];

export interface Expected {
  readonly permission: Permission;
  readonly may: readonly Actor[];
  /** What somebody who may gets for an empty request about nothing: 200, 400 (bad-request), 404 … */
  readonly gets: number;
  /**
   * The same route asked for a thing of the north shed by somebody who may do all, but in the south shed alone; or
   * why there is no such request.
   */
  readonly otherShed: { readonly path?: string; readonly body?: object } | string;
}

const EVERYBODY = ACTORS;
const WHOEVER_WORKS = ['tablet', 'weaver', 'tackler', 'foreman', 'manager'] as const;
const OFFICE = ['foreman', 'manager'] as const;
const TACKLING = ['tackler', 'foreman', 'manager'] as const;

const line = (
  permission: Permission,
  may: readonly Actor[],
  gets: number,
  otherShed: Expected['otherShed'],
): Expected => ({ permission, may, gets, otherShed });

/** A route that is not in this table fails the test: say here who may use it before it is mounted. */
export const EXPECTED: Record<string, Expected> = {
  'get /api/health': line('public', EVERYBODY, 200, 'names no shed'),
  'get /api/openapi.json': line('public', EVERYBODY, 200, 'names no shed'),
  'post /api/sessions/office': line('public', EVERYBODY, 400, 'names no shed'),
  'post /api/sessions/floor': line('public', EVERYBODY, 400, 'the tablet’s shed: see sessions.spec.ts'),
  'post /api/sessions/refresh': line('public', EVERYBODY, 200, 'names no shed'),
  'post /api/sessions/end': line('public', EVERYBODY, 200, 'names no shed'),
  'post /api/first-run': line('public', EVERYBODY, 400, 'names no shed'),
  'post /api/devices': line('devices.register', OFFICE, 400, {
    body: { name: 'By the door', shedId: 'north' },
  }),
  'get /api/devices': line('devices.register', OFFICE, 200, 'lists own sheds alone: see devices.spec.ts'),
  'post /api/devices/{id}/revoke': line('devices.manage', ['manager'], 404, {
    path: '/api/devices/tablet-north/revoke',
  }),
  'get /api/people': line('people.read', OFFICE, 200, 'names no shed'),
  'post /api/people': line('people.manage', ['manager'], 400, {
    body: {
      name: 'Nell New',
      shortName: 'Nell',
      worksNumber: null,
      email: null,
      roles: ['manager'],
      shedIds: ['north', 'south'],
    },
  }),
  'patch /api/people/{id}': line('people.manage', ['manager'], 404, {
    path: '/api/people/wanda',
    body: { disabled: true },
  }),
  'post /api/people/{id}/invite': line('people.manage', ['manager'], 404, {
    path: '/api/people/wanda/invite',
  }),
  'post /api/people/pin-slips': line('people.manage', ['manager'], 400, { body: { ids: ['wanda'] } }),
  'post /api/sessions/forgotten': line('public', EVERYBODY, 400, 'names no shed'),
  'post /api/sessions/one-time/look': line('public', EVERYBODY, 400, 'names no shed'),
  'post /api/sessions/one-time/redeem': line('public', EVERYBODY, 400, 'names no shed'),
  'post /api/devices/codes': line('devices.register', OFFICE, 400, {
    body: { name: 'By the door', shedId: 'north' },
  }),
  'post /api/devices/register-by-code': line(
    'public',
    EVERYBODY,
    400,
    'the code’s shed: see tablet-codes.spec.ts',
  ),
  'patch /api/devices/{id}': line('devices.manage', ['manager'], 400, {
    path: '/api/devices/tablet-north',
    body: { name: 'By the door' },
  }),
  'get /api/set-up/mail': line('mill.manage', ['manager'], 200, {}),
  'patch /api/set-up/mail': line('mill.manage', ['manager'], 400, {
    body: { host: '', port: 587, security: 'starttls', user: '', from: '' },
  }),
  'post /api/set-up/mail/test': line('mill.manage', ['manager'], 400, { body: { to: 'maud@mill.example' } }),
  'get /api/set-up/letters': line('mill.manage', ['manager'], 200, {}),
  'get /api/set-up/letters/{id}': line('mill.manage', ['manager'], 404, {}),
  'post /api/set-up/letters/{id}/again': line('mill.manage', ['manager'], 404, {}),
  'get /api/set-up/letters/{id}/file': line('mill.manage', ['manager'], 404, {}),
  'post /api/sync/entries': line(
    'entries.push',
    [...WHOEVER_WORKS, 'revokedTablet'],
    400,
    'each entry has its own result: entry-other-shed',
  ),
  'post /api/sync/bring-in': line(
    'entries.bring-in',
    OFFICE,
    400,
    'each entry has its own result: see bring-in.spec.ts',
  ),
  'get /api/sync/changes': line('changes.read', WHOEVER_WORKS, 200, {
    path: '/api/sync/changes?shedId=north',
  }),
  'get /api/sync/feed': line('changes.read', WHOEVER_WORKS, 200, { path: '/api/sync/feed?shedId=north' }),
  'get /api/reports/sheds': line('sheet.read', OFFICE, 200, 'lists own sheds alone'),
  'get /api/reports/shifts': line('sheet.read', OFFICE, 400, {
    path: '/api/reports/shifts?shedId=north&from=2026-03-09&to=2026-03-10',
  }),
  'get /api/reports/shifts/{key}/sheet.pdf': line('sheet.read', OFFICE, 404, {
    path: '/api/reports/shifts/north:2026-03-10:north-early/sheet.pdf',
  }),
  'get /api/reports/shifts/{key}/sheet': line('sheet.read', OFFICE, 404, {
    path: '/api/reports/shifts/north:2026-03-10:north-early/sheet',
  }),
  'get /api/reports/shifts/{key}/looms/{loomId}': line('sheet.read', OFFICE, 404, {
    path: '/api/reports/shifts/north:2026-03-10:north-early/looms/n1',
  }),
  'get /api/reports/shifts/{key}/held': line('sheet.read', OFFICE, 404, {
    path: '/api/reports/shifts/north:2026-03-10:north-early/held',
  }),
  'get /api/reports/shifts/{key}/signed': line('sheet.read', OFFICE, 404, {
    path: '/api/reports/shifts/north:2026-03-10:north-early/signed',
  }),
  'get /api/reports/usual': line('changes.read', WHOEVER_WORKS, 400, {
    path: '/api/reports/usual?shedId=north',
  }),
  'get /api/reports/weeks': line('weeks.read', OFFICE, 400, {
    path: '/api/reports/weeks?shedId=north&by=loom&from=2026-03-02&to=2026-03-09',
  }),
  'get /api/reports/loom-history': line('calls.read', TACKLING, 400, {
    path: '/api/reports/loom-history?loomId=n1',
  }),
  'get /api/reports/tackler-ahead': line('calls.read', TACKLING, 400, {
    path: '/api/reports/tackler-ahead?shedId=north',
  }),
  'get /api/push/key': line('calls.read', TACKLING, 200, 'names no shed'),
  'post /api/push/subscriptions': line(
    'calls.read',
    TACKLING,
    400,
    'is told of own sheds alone: see push.spec.ts',
  ),
  'post /api/push/subscriptions/end': line('calls.read', TACKLING, 400, 'names no shed'),
  'post /api/photos/{id}': line(
    'entries.push',
    [...WHOEVER_WORKS, 'revokedTablet'],
    400,
    'only from the device that logged its repair: see photos.spec.ts',
  ),
  'get /api/photos/{id}': line('calls.read', TACKLING, 404, 'a photo of the north shed: see photos.spec.ts'),
};
