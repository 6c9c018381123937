import {
  aheadQuerySchema,
  loomHistoryQuerySchema,
  loomHistorySchema,
  tacklerAheadSchema,
} from '../../../shared/contract/calls.js';
import { ApiError } from '../../middleware/api-error.js';
import { maySeeShed } from '../../middleware/principal.js';
import { route, type Route } from '../route.js';
import { historyOf } from './calls.service.js';

export const callsRoutes: Route[] = [
  route({
    method: 'get',
    path: '/reports/loom-history',
    permission: 'calls.read',
    summary:
      'A loom for its tackler: repairs and repeats, breaks before and after each, its warp, jobs of care.',
    query: loomHistoryQuerySchema,
    answer: loomHistorySchema,
    errors: ['not-found', 'other-shed'],
    handle: ({ deps, principal, query }) => historyOf(deps, principal, query.loomId),
  }),
  route({
    method: 'get',
    path: '/reports/tackler-ahead',
    permission: 'calls.read',
    summary:
      'What comes up in a shed: warps that run out, with a range, and jobs of care that are due by picks.',
    query: aheadQuerySchema,
    answer: tacklerAheadSchema,
    errors: ['other-shed'],
    handle: ({ deps, principal, query: { shedId } }) => {
      if (!maySeeShed(principal, shedId)) throw new ApiError('other-shed');
      return deps.reports.run('tacklerAhead', { shedId, asOf: deps.now() });
    },
  }),
];
