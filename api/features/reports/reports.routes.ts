import * as z from 'zod/mini';
import { refSchema } from '../../../shared/contract/primitives.js';
import {
  shedListSchema,
  shiftListQuerySchema,
  shiftListSchema,
  shiftSheetSchema,
  weeksQuerySchema,
  weeksSchema,
} from '../../../shared/contract/reports.js';
import {
  heldEntriesSchema,
  loomRecordSchema,
  signedVersionsSchema,
} from '../../../shared/contract/shift-records.js';
import { usualQuerySchema, usualSchema } from '../../../shared/contract/usual.js';
import type { Deps } from '../../deps.js';
import { ApiError, wrongField } from '../../middleware/api-error.js';
import { maySeeShed, type Principal } from '../../middleware/principal.js';
import { route, type Route } from '../route.js';

/** Longest ranges that are shown at once. */
const DATES = 62;
const WEEKS = 60;
const DAY = 86_400_000;

export const reportRoutes: Route[] = [
  route({
    method: 'get',
    path: '/reports/sheds',
    permission: 'sheet.read',
    summary: 'The sheds that the person may see.',
    answer: shedListSchema,
    handle: async ({ deps, principal }) => {
      const sheds = await deps.reads.query<{ id: string; name: string }[]>(
        `SELECT "id", "name" FROM "shed" ORDER BY "name", "id"`,
      );
      return { sheds: sheds.filter((shed) => maySeeShed(principal, shed.id)) };
    },
  }),
  route({
    method: 'get',
    path: '/reports/shifts',
    permission: 'sheet.read',
    summary: 'A shed’s shifts by date, each with the shed’s figures.',
    query: shiftListQuerySchema,
    answer: shiftListSchema,
    errors: ['other-shed'],
    handle: ({ deps, principal, query }) => {
      requireShed(principal, query.shedId);
      requireRange(query, DATES * DAY);
      return deps.reports.run('shifts', query);
    },
  }),
  route({
    method: 'get',
    path: '/reports/shifts/:key/sheet',
    permission: 'sheet.read',
    summary: 'A shift’s sheet: every loom’s line with its figures, and the shed’s.',
    params: z.object({ key: refSchema }),
    answer: shiftSheetSchema,
    errors: ['not-found', 'other-shed'],
    handle: async ({ deps, principal, params }) => {
      await requireShift(deps, principal, params.key);
      return there(await deps.reports.run('sheet', { shiftKey: params.key, asOf: deps.now() }));
    },
  }),
  route({
    method: 'get',
    path: '/reports/shifts/:key/sheet.pdf',
    permission: 'sheet.read',
    summary: 'The same sheet as a PDF: A4, black on white.',
    params: z.object({ key: refSchema }),
    errors: ['not-found', 'other-shed'],
    handle: async ({ deps, principal, params, response }) => {
      await requireShift(deps, principal, params.key);
      const pdf = there(await deps.reports.run('sheetPdf', { shiftKey: params.key, asOf: deps.now() }));
      const name = `shift-${params.key.replace(/[^A-Za-z0-9-]+/g, '-')}.pdf`;
      response.type('application/pdf').attachment(name).send(Buffer.from(pdf));
    },
  }),
  route({
    method: 'get',
    path: '/reports/shifts/:key/looms/:loomId',
    permission: 'sheet.read',
    summary:
      'One loom line with its whole record: every entry, its author, its corrections, what was decided.',
    params: z.object({ key: refSchema, loomId: refSchema }),
    answer: loomRecordSchema,
    errors: ['not-found', 'other-shed'],
    handle: async ({ deps, principal, params: { key, loomId } }) => {
      await requireShift(deps, principal, key);
      return there(await deps.reports.run('loomRecord', { shiftKey: key, loomId, asOf: deps.now() }));
    },
  }),
  route({
    method: 'get',
    path: '/reports/shifts/:key/held',
    permission: 'sheet.read',
    summary: 'Entries that wait for a decision about a shift, and what each would change.',
    params: z.object({ key: refSchema }),
    answer: heldEntriesSchema,
    errors: ['not-found', 'other-shed'],
    handle: async ({ deps, principal, params }) => {
      await requireShift(deps, principal, params.key);
      return there(await deps.reports.run('heldEntries', { shiftKey: params.key, asOf: deps.now() }));
    },
  }),
  route({
    method: 'get',
    path: '/reports/shifts/:key/signed',
    permission: 'sheet.read',
    summary: 'Every signed version of a shift, each with what it changed.',
    params: z.object({ key: refSchema }),
    answer: signedVersionsSchema,
    errors: ['not-found', 'other-shed'],
    handle: async ({ deps, principal, params }) => {
      await requireShift(deps, principal, params.key);
      return there(await deps.reports.run('signedVersions', { shiftKey: params.key }));
    },
  }),
  route({
    method: 'get',
    path: '/reports/usual',
    permission: 'changes.read',
    summary: 'What each loom usually gives with each cloth, whoever minds it: for a tablet to keep.',
    query: usualQuerySchema,
    answer: usualSchema,
    errors: ['other-shed'],
    handle: ({ deps, principal, query }) => {
      requireShed(principal, query.shedId);
      return deps.reports.run('usual', { ...query, asOf: deps.now() });
    },
  }),
  route({
    method: 'get',
    path: '/reports/weeks',
    permission: 'weeks.read',
    summary: 'Looms, or rows of looms, week over week: ratios of sums over closed shifts.',
    query: weeksQuerySchema,
    answer: weeksSchema,
    errors: ['other-shed'],
    handle: ({ deps, principal, query }) => {
      requireShed(principal, query.shedId);
      requireRange(query, WEEKS * 7 * DAY);
      return deps.reports.run('weeks', query);
    },
  }),
];

async function requireShift(deps: Deps, principal: Principal, key: string): Promise<void> {
  const [shift] = await deps.reads.query<{ shedId: string }[]>(
    `SELECT "shedId" FROM "shift" WHERE "key" = ?`,
    [key],
  );
  if (!shift) throw new ApiError('not-found');
  requireShed(principal, shift.shedId);
}

function there<T>(answer: T | null): T {
  if (answer === null) throw new ApiError('not-found');
  return answer;
}

function requireShed(principal: Principal, shedId: string): void {
  if (!maySeeShed(principal, shedId)) throw new ApiError('other-shed');
}

function requireRange({ from, to }: { from: string; to: string }, longest: number): void {
  const [first, last] = [Date.parse(`${from}T00:00Z`), Date.parse(`${to}T00:00Z`)];
  if (Number.isNaN(first)) throw wrongField('from', 'This is not a date.');
  if (Number.isNaN(last)) throw wrongField('to', 'This is not a date.');
  if (last < first) throw wrongField('to', 'The last date lies before the first.');
  if (last - first > longest) throw wrongField('to', 'This is more than is shown at once.');
}
