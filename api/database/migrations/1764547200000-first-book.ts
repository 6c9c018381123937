import type { MigrationInterface, QueryRunner } from 'typeorm';

/** The tables that the main job stands on. */
export class FirstBook1764547200000 implements MigrationInterface {
  readonly name = 'FirstBook1764547200000';

  async up(runner: QueryRunner): Promise<void> {
    for (const statement of UP) await runner.query(statement);
  }

  async down(runner: QueryRunner): Promise<void> {
    for (const table of TABLES) await runner.query(`DROP TABLE "${table}"`);
  }
}

const TABLES = [
  'change',
  'loom_line',
  'fitting',
  'stand',
  'entry_hold',
  'entry_loom',
  'entry',
  'access_grant',
  'refresh_token',
  'session',
  'device',
  'person_rights',
  'person',
  'signed_totals',
  'shift',
  'calendar_day',
  'shift_pattern',
  'cause_version',
  'warp',
  'cloth_version',
  'cloth',
  'loom_version',
  'loom',
  'shed',
  'meta',
  'mill',
];

const UP = [
  `CREATE TABLE "mill" ("id" integer PRIMARY KEY NOT NULL, "name" text NOT NULL, "timeZone" text NOT NULL, "units" text NOT NULL)`,
  `CREATE TABLE "meta" ("key" text PRIMARY KEY NOT NULL, "value" text NOT NULL)`,
  `CREATE TABLE "shed" ("id" text PRIMARY KEY NOT NULL, "name" text NOT NULL)`,
  `CREATE TABLE "loom" ("id" text PRIMARY KEY NOT NULL, "shedId" text NOT NULL REFERENCES "shed"("id"), "number" integer NOT NULL, "row" integer NOT NULL, "position" integer NOT NULL, "alley" text NOT NULL, "from" integer NOT NULL, "until" integer)`,
  `CREATE TABLE "loom_version" ("id" text PRIMARY KEY NOT NULL, "loomId" text NOT NULL REFERENCES "loom"("id"), "effectiveAt" integer NOT NULL, "ppm" real NOT NULL, "reedSpaceCm" real NOT NULL, "clock" text NOT NULL, "shuttles" integer NOT NULL, "battery" boolean NOT NULL)`,
  `CREATE INDEX "loom_version_loom" ON "loom_version" ("loomId", "effectiveAt")`,
  `CREATE TABLE "cloth" ("id" text PRIMARY KEY NOT NULL, "name" text NOT NULL)`,
  `CREATE TABLE "cloth_version" ("id" text PRIMARY KEY NOT NULL, "clothId" text NOT NULL REFERENCES "cloth"("id"), "effectiveAt" integer NOT NULL, "ends" integer NOT NULL, "picksPerCmOnLoom" real NOT NULL, "picksPerCmLoomState" real NOT NULL, "reedWidthCm" real NOT NULL, "crimp" real NOT NULL, "abreast" integer NOT NULL, "wefts" text NOT NULL)`,
  `CREATE TABLE "warp" ("id" text PRIMARY KEY NOT NULL, "name" text NOT NULL, "clothId" text NOT NULL REFERENCES "cloth"("id"), "lengthM" real NOT NULL, "thrumM" real NOT NULL)`,
  `CREATE TABLE "cause_version" ("id" text PRIMARY KEY NOT NULL, "causeId" text NOT NULL, "effectiveAt" integer NOT NULL, "name" text NOT NULL, "group" text NOT NULL, "attendedBy" text NOT NULL, "allowanceS" real, "breakOf" text)`,
  `CREATE TABLE "shift_pattern" ("id" text PRIMARY KEY NOT NULL, "shedId" text NOT NULL REFERENCES "shed"("id"), "name" text NOT NULL, "startsLocal" text NOT NULL, "endsLocal" text NOT NULL, "weekdays" text NOT NULL, "meal" text)`,
  `CREATE TABLE "calendar_day" ("shedId" text NOT NULL REFERENCES "shed"("id"), "date" text NOT NULL, "patternId" text NOT NULL, "kind" text NOT NULL, "startsLocal" text, "endsLocal" text, "reason" text NOT NULL, PRIMARY KEY ("shedId", "date", "patternId"))`,
  `CREATE TABLE "shift" ("key" text PRIMARY KEY NOT NULL, "shedId" text NOT NULL REFERENCES "shed"("id"), "date" text NOT NULL, "patternId" text NOT NULL, "name" text NOT NULL, "startsAt" integer NOT NULL, "endsAt" integer NOT NULL, "mealStartsAt" integer, "mealEndsAt" integer, "mealLooms" text, "state" text NOT NULL)`,
  `CREATE INDEX "shift_shed_start" ON "shift" ("shedId", "startsAt")`,
  `CREATE INDEX "shift_shed_date" ON "shift" ("shedId", "date")`,
  `CREATE TABLE "signed_totals" ("shiftKey" text NOT NULL REFERENCES "shift"("key"), "version" integer NOT NULL, "at" integer NOT NULL, "by" text NOT NULL, "entryId" text NOT NULL, "totals" text NOT NULL, "versionIds" text NOT NULL, PRIMARY KEY ("shiftKey", "version"))`,
  `CREATE TABLE "person" ("id" text PRIMARY KEY NOT NULL, "name" text NOT NULL, "shortName" text NOT NULL, "worksNumber" text UNIQUE, "email" text UNIQUE, "passwordHash" text, "pinHash" text, "usualSet" text NOT NULL)`,
  `CREATE TABLE "person_rights" ("personId" text NOT NULL REFERENCES "person"("id"), "effectiveAt" integer NOT NULL, "roles" text NOT NULL, "shedIds" text NOT NULL, "disabled" boolean NOT NULL, PRIMARY KEY ("personId", "effectiveAt"))`,
  `CREATE TABLE "device" ("id" text PRIMARY KEY NOT NULL, "kind" text NOT NULL, "name" text NOT NULL, "shedId" text REFERENCES "shed"("id"), "secretHash" text, "registeredBy" text, "registeredAt" integer NOT NULL, "revokedAt" integer, "lastSeenAt" integer, "clockOffset" integer, "appVersion" text)`,
  `CREATE TABLE "session" ("id" text PRIMARY KEY NOT NULL, "personId" text NOT NULL REFERENCES "person"("id"), "deviceId" text NOT NULL REFERENCES "device"("id"), "kind" text NOT NULL, "startedAt" integer NOT NULL, "expiresAt" integer NOT NULL, "endedAt" integer, "endedWhy" text)`,
  `CREATE INDEX "session_person" ON "session" ("personId")`,
  `CREATE TABLE "refresh_token" ("id" text PRIMARY KEY NOT NULL, "sessionId" text NOT NULL REFERENCES "session"("id"), "secretHash" text NOT NULL, "parentId" text, "issuedAt" integer NOT NULL, "usedAt" integer, "retiredAt" integer)`,
  `CREATE INDEX "refresh_token_session" ON "refresh_token" ("sessionId")`,
  `CREATE TABLE "access_grant" ("id" text PRIMARY KEY NOT NULL, "personId" text NOT NULL REFERENCES "person"("id"), "deviceId" text NOT NULL REFERENCES "device"("id"), "issuedAt" integer NOT NULL)`,
  `CREATE INDEX "access_grant_device" ON "access_grant" ("deviceId", "personId")`,
  `CREATE TABLE "entry" ("seq" integer PRIMARY KEY AUTOINCREMENT NOT NULL, "id" text NOT NULL UNIQUE, "kind" text NOT NULL, "shedId" text NOT NULL REFERENCES "shed"("id"), "at" integer NOT NULL, "until" integer, "changedAt" integer, "shiftKey" text REFERENCES "shift"("key"), "targetId" text, "targetBatchId" text, "batchId" text, "by" text NOT NULL, "deviceId" text NOT NULL, "deviceSeq" integer NOT NULL, "receivedAt" integer NOT NULL, "body" text NOT NULL)`,
  `CREATE INDEX "entry_target" ON "entry" ("targetId") WHERE "targetId" IS NOT NULL`,
  `CREATE INDEX "entry_target_batch" ON "entry" ("targetBatchId") WHERE "targetBatchId" IS NOT NULL`,
  `CREATE INDEX "entry_batch" ON "entry" ("batchId") WHERE "batchId" IS NOT NULL`,
  `CREATE INDEX "entry_shift" ON "entry" ("shiftKey", "seq")`,
  `CREATE INDEX "entry_shed_at" ON "entry" ("shedId", "at")`,
  `CREATE INDEX "entry_warp_change" ON "entry" ("shedId", "seq") WHERE "kind" = 'warp-change'`,
  `CREATE INDEX "entry_device" ON "entry" ("deviceId", "deviceSeq")`,
  `CREATE TABLE "entry_loom" ("loomId" text NOT NULL, "seq" integer NOT NULL, "at" integer NOT NULL, "shiftKey" text, PRIMARY KEY ("loomId", "seq"))`,
  `CREATE INDEX "entry_loom_at" ON "entry_loom" ("loomId", "at")`,
  `CREATE INDEX "entry_loom_shift" ON "entry_loom" ("loomId", "shiftKey")`,
  `CREATE TABLE "entry_hold" ("entryId" text NOT NULL, "shiftKey" text NOT NULL, "reason" text NOT NULL, "state" text NOT NULL, "decidedBy" text, PRIMARY KEY ("entryId", "shiftKey"))`,
  `CREATE INDEX "entry_hold_shift" ON "entry_hold" ("shiftKey", "state")`,
  `CREATE TABLE "stand" ("stopId" text NOT NULL, "loomId" text NOT NULL, "shedId" text NOT NULL, "from" integer NOT NULL, "until" integer, "cause" text NOT NULL, PRIMARY KEY ("stopId", "loomId"))`,
  `CREATE INDEX "stand_loom" ON "stand" ("loomId", "until", "from")`,
  `CREATE TABLE "fitting" ("id" text PRIMARY KEY NOT NULL, "loomId" text NOT NULL, "effectiveAt" integer NOT NULL, "warpId" text, "clothId" text NOT NULL, "how" text NOT NULL)`,
  `CREATE INDEX "fitting_loom" ON "fitting" ("loomId", "effectiveAt")`,
  `CREATE TABLE "loom_line" ("shiftKey" text NOT NULL REFERENCES "shift"("key"), "loomId" text NOT NULL REFERENCES "loom"("id"), "shedId" text NOT NULL, "date" text NOT NULL, "week" text NOT NULL, "row" integer NOT NULL, "clothId" text, "picksBy" text NOT NULL, "minutes" real NOT NULL, "plannedMinutes" real NOT NULL, "shedStopMinutes" real NOT NULL, "stopMinutes" real NOT NULL, "measuredMinutes" real NOT NULL, "estimatedMinutes" real NOT NULL, "possiblePicks" real, "possibleScheduled" real, "possibleLessShed" real, "measuredPicks" real, "estimatedPicks" real, "picks" real, "weavingMinutes" real, "pickEnds" real, "warpBreaks" integer NOT NULL, "weftBreaks" integer NOT NULL, "stops" integer NOT NULL, "perns" integer NOT NULL, "flagCount" integer NOT NULL, "counted" integer NOT NULL, "minutesByCause" text NOT NULL, "line" text NOT NULL, PRIMARY KEY ("shiftKey", "loomId"))`,
  `CREATE INDEX "loom_line_shed_date" ON "loom_line" ("shedId", "date")`,
  `CREATE INDEX "loom_line_shed_week" ON "loom_line" ("shedId", "week", "loomId")`,
  `CREATE TABLE "change" ("seq" integer PRIMARY KEY AUTOINCREMENT NOT NULL, "shedId" text, "kind" text NOT NULL, "ref" text NOT NULL)`,
  `CREATE INDEX "change_shed" ON "change" ("shedId", "seq")`,
];
