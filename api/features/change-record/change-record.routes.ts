import { changeRecordQuerySchema, changeRecordSchema } from '../../../shared/contract/set-up.js';
import { route } from '../route.js';
import { readChanges } from './read-changes.js';

export const changeRecordRoutes = [
  route({
    method: 'get',
    path: '/set-up/changes',
    permission: 'mill.manage',
    summary: 'What was changed in set-up, newest first: who, when, before and after. Never edited.',
    query: changeRecordQuerySchema,
    answer: changeRecordSchema,
    errors: ['bad-request'],
    handle: ({ deps, query }) => readChanges(deps.reads.manager, query),
  }),
];
