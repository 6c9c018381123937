/** Where the server answers. Routes of reports and set-up are named by the features that use them. */
export const API = {
  refresh: '/api/sessions/refresh',
  signInFloor: '/api/sessions/floor',
  signInOffice: '/api/sessions/office',
  signOut: '/api/sessions/end',
  firstRun: '/api/first-run',
  forgotten: '/api/sessions/forgotten',
  lookAtLink: '/api/sessions/one-time/look',
  redeemLink: '/api/sessions/one-time/redeem',
  devices: '/api/devices',
  registerByCode: '/api/devices/register-by-code',
  push: '/api/sync/entries',
  bringIn: '/api/sync/bring-in',
  pull: '/api/sync/changes',
  live: '/api/sync/feed',
} as const;
