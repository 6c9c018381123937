/** Where the server answers. Routes of reports and set-up are named by the features that use them. */
export const API = {
  refresh: '/api/session/refresh',
  signInFloor: '/api/session/floor',
  signInOffice: '/api/session/office',
  signOut: '/api/session/sign-out',
  firstRun: '/api/first-run',
  devices: '/api/devices',
  push: '/api/sync/entries',
  pull: '/api/sync/changes',
  live: '/api/sync/live',
} as const;
