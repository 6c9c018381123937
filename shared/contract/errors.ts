import * as z from 'zod/mini';

/**
 * Every way in which the server says no: a stable code, an HTTP status for the routes, and the sentence that a
 * person reads. The sentence says what is wrong, what is safe, what to do. Entries carry the same codes in their
 * own results, since one bad entry never blocks its neighbours.
 */
export const ERRORS = {
  // what is asked
  'bad-json': [400, 'This is not JSON. Nothing was stored; send it again as JSON.'],
  'bad-request': [
    400,
    'Something in this form is not as it should be. Nothing was stored; mend what is marked.',
  ],
  'too-large': [
    413,
    'This is more than the book takes at once. Nothing was stored; it will be sent in smaller parts.',
  ],
  'too-many-entries': [
    413,
    'More than 500 entries at once. Nothing was stored; they will be sent in smaller parts.',
  ],
  'not-found': [404, 'There is nothing here.'],
  conflict: [409, 'Somebody else changed this meanwhile. Look at it again, then repeat your change.'],
  // who asks
  'not-signed-in': [401, 'You are not signed in. What you logged is safe on this tablet; sign in again.'],
  'session-ended': [401, 'This sign-in has ended. What you logged is safe on this tablet; sign in again.'],
  'bad-token': [401, 'This sign-in is not one of ours. Sign in again.'],
  'wrong-sign-in': [401, 'Number and PIN, or e-mail and password, do not go together. Try again.'],
  'device-unknown': [401, 'This tablet is not registered. A foreman or manager registers it once.'],
  'device-revoked': [
    403,
    'This tablet was withdrawn. It may hand in what it holds, nothing else; ask the foreman.',
  ],
  'not-permitted': [403, 'Your role may not do this. Ask the foreman or the manager.'],
  'other-shed': [403, 'This belongs to another shed.'],
  'bad-origin': [403, 'This request came from another site and was not carried out.'],
  'bad-code': [
    403,
    'This code is not right or was used already. The server prints a new one when it starts.',
  ],
  'already-set-up': [409, 'This mill has its first manager already. Sign in.'],
  'last-manager': [
    409,
    'This is the mill’s only manager, so nothing was changed. Make somebody else a manager first.',
  ],
  'password-too-long': [400, 'This password is longer than 72 bytes. Choose a shorter one.'],
  'password-too-short': [400, 'A password needs at least 10 characters.'],
  'bad-pin': [400, 'A PIN is six digits.'],
  // load and trouble
  'too-many-tries': [429, 'Too many tries. Wait a little, then try again.'],
  busy: [503, 'The book is busy. Nothing was lost; it will be tried again.'],
  'disk-full': [503, 'The server’s disk is full. What you logged is safe on this tablet; tell the manager.'],
  'closing-down': [
    503,
    'The server is closing down. What you logged is safe on this tablet and will be sent later.',
  ],
  internal: [
    500,
    'The server made a mistake. What you logged is safe on this tablet; it will be tried again.',
  ],
  // entries
  'entry-malformed': [
    422,
    'This entry is not complete, so the book cannot take it. It stays on this tablet.',
  ],
  'id-reused': [
    422,
    'The book holds another entry under this number. This one stays on this tablet; show it to the foreman.',
  ],
  'loom-unknown': [422, 'The book has no such loom. The entry stays on this tablet; show it to the foreman.'],
  'loom-not-yet': [
    422,
    'The loom was not in the shed at that time. The entry stays on this tablet; check the time.',
  ],
  'cause-unknown': [422, 'The book has no such cause. The entry stays on this tablet.'],
  'person-unknown': [422, 'The book does not know this person. The entry stays on this tablet.'],
  'shift-unknown': [
    422,
    'The book has no such shift. The entry stays on this tablet; show it to the foreman.',
  ],
  'end-before-start': [
    422,
    'The end lies before the beginning. The entry stays on this tablet; log it again with the right times.',
  ],
  'reading-impossible': [
    422,
    'The pick clock cannot show this reading. The entry stays on this tablet; read the clock again.',
  ],
  'grant-unknown': [
    422,
    'This entry was not logged by somebody signed in on this tablet. It stays here; show it to the foreman.',
  ],
  'entry-not-permitted': [
    422,
    'The role of who logged this may not do so. It stays on this tablet; show it to the foreman.',
  ],
  'entry-other-shed': [
    422,
    'This tablet belongs to another shed. The entry stays on this tablet; show it to the foreman.',
  ],
  'schema-too-old': [
    422,
    'This entry comes from a version of the application that is no longer read. Export it and show it to the manager.',
  ],
  'held-undecided': [
    422,
    'Some entries that came after this shift was closed still wait. Accept or refuse them, then close it again.',
  ],
  // photos of a repair
  'photo-not-an-image': [
    415,
    'This is not a picture that the book can read (JPEG, PNG or WebP). It stays on this tablet; take it again.',
  ],
  'photo-too-large': [
    413,
    'This picture is larger than the book takes (8 MB, 40 megapixels). It stays on this tablet; take it again.',
  ],
  'photo-no-repair': [
    409,
    'The book has no repair that names this picture yet. It stays on this tablet and is sent again later.',
  ],
  'photo-other': [
    409,
    'The book holds another picture under this number. This one stays on this tablet; show it to the foreman.',
  ],
  // a browser's subscription to calls
  'push-address-refused': [
    422,
    'This address cannot be told of calls. Calls still show, sound and shake on this device while the page is open.',
  ],
  // one-time links, codes and letters
  'link-wrong': [
    404,
    'This link is not one of ours, or its address was cut short. Open it from the letter once more, or ask for a new one.',
  ],
  'link-used': [
    410,
    'This link was used already, and works once. Sign in with the password chosen then, or ask for a new link.',
  ],
  'link-expired': [410, 'This link has run out. Nothing was changed; ask for a new one.'],
  'link-replaced': [410, 'A newer letter has taken the place of this one. Use the link in the newest.'],
  'no-email': [
    409,
    'This person has no e-mail address, so no letter can go out. Enter one, or print a PIN slip.',
  ],
  'no-works-number': [
    409,
    'Somebody of these has no works number, which a PIN goes with. No PIN was changed; give a number first.',
  ],
  'tablet-code-wrong': [
    403,
    'This code is not right. Look at it again: eight letters and digits, without the letters I, L and O.',
  ],
  'tablet-code-used': [403, 'This code has made a tablet already, and works once. Ask for another.'],
  'tablet-code-expired': [403, 'This code has run out: it holds for 15 minutes. Ask for another.'],
  'already-tablet': [
    409,
    'This browser is a registered tablet already, so nothing was changed. Use the code on another one.',
  ],
} as const satisfies Record<string, readonly [number, string]>;

export type ErrorCode = keyof typeof ERRORS;
export const ERROR_CODES = Object.keys(ERRORS) as [ErrorCode, ...ErrorCode[]];

/** The sentence for a person. */
export function sentenceOf(code: ErrorCode): string {
  return ERRORS[code][1];
}

/** The HTTP status a route answers with. */
export function statusOf(code: ErrorCode): number {
  return ERRORS[code][0];
}

/** Why an entry waits for a decision. None of these loses it; a foreman accepts or refuses it with a reason. */
export const HOLDS = {
  'shift-closed': 'The shift was closed before this came. The foreman decides whether it still counts.',
  'no-shift': 'No shift was running then. It counts when the foreman opens one, or accepts it.',
  'time-doubtful': 'The tablet’s clock makes the time of this doubtful. The foreman decides.',
  'rights-lost': 'Whoever logged this had no right to at that time. The foreman decides.',
  'device-revoked': 'The tablet had been withdrawn when this came. The foreman decides.',
  'target-missing': 'This corrects or ends an entry that has not come yet. It counts as soon as that comes.',
} as const;
export type HoldReason = keyof typeof HOLDS;
export const HOLD_REASONS = Object.keys(HOLDS) as [HoldReason, ...HoldReason[]];

/** RFC 9457, with our stable `code` and the fields that a form marks. */
export const problemSchema = z.object({
  type: z.string(),
  title: z.string(),
  status: z.int(),
  code: z.enum(ERROR_CODES),
  detail: z.optional(z.string()),
  fields: z.optional(z.array(z.object({ path: z.string(), message: z.string() }))),
});
export type Problem = z.infer<typeof problemSchema>;
