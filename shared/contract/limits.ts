/** Limits that both ends keep. Times in milliseconds unless the name says otherwise. */
export const LIMITS = {
  /** Entries in one push. */
  entriesPerPush: 500,
  /** Bytes of one request body. 500 of the largest entries fit. */
  bodyBytes: 2_000_000,
  /** Rows in one answer to a pull. */
  changesPerPull: 1_000,
  /** Characters of a note, a reason, a name. */
  textLength: 2_000,
  reasonLength: 500,
  nameLength: 80,
  /** Largest count in one stop or one hand-over count. */
  count: 10_000,
  /** Digits a pick clock may have. */
  clockDigits: 9,
  pinDigits: 6,
  /** bcrypt reads 72 bytes; a longer password would be cut silently, so it is refused. */
  passwordBytes: 72,
  passwordLength: 10,
  /** An offset of the device's clock above this is shown to the foreman. */
  clockOffsetShown: 2 * 60_000,
  /** A corrected moment further ahead of the server than this is doubtful. */
  futureTolerance: 2 * 60_000,
  /** A corrected moment older than this is doubtful. */
  oldestMoment: 35 * 86_400_000,
  /** A reading further off its boundary than this makes T the time between the readings. */
  readingOffBoundary: 5 * 60_000,
  /** How long acknowledged entries stay on the device, to be sent again if the server lost them. */
  resendWindow: 14 * 86_400_000,
  /** How far ahead the server sends shifts. */
  shiftsAhead: 35 * 86_400_000,
  accessTokenSeconds: 15 * 60,
  floorSession: 16 * 3_600_000,
  officeSession: 30 * 86_400_000,
  undoWindow: 10_000,
  feedComment: 15_000,
  /** Photos of one repair; the longest side that a device sends, px; bytes and pixels that the server takes. */
  photosPerRepair: 6,
  photoSide: 1_600,
  photoBytes: 8_000_000,
  photoPixels: 40_000_000,
  /** Looms in one person's usual set. */
  usualSet: 100,
  /** How long the links in letters work: to a new person, to somebody who forgot a password; a tablet's code. */
  inviteLink: 7 * 86_400_000,
  resetLink: 3_600_000,
  tabletCode: 15 * 60_000,
} as const;
