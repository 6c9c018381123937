import { recalculatedSchema, recalculateSchema, setUpSchema } from '../../../shared/contract/set-up.js';
import { route, type Route } from '../route.js';
import { changeRecordRoutes } from '../change-record/change-record.routes.js';
import { goodsRoutes } from './goods.routes.js';
import { loomRoutes } from './looms.routes.js';
import { patternRoutes } from './patterns.routes.js';
import { readSetUp } from './read-set-up.js';
import { recalculate } from './recalculate.service.js';

/** What a manager says of the mill. Every change is dated, recorded and told to the tablets. */
export const setUpRoutes: readonly Route[] = [
  route({
    method: 'get',
    path: '/set-up',
    permission: 'mill.manage',
    summary: 'The whole mill as set-up shows it.',
    answer: setUpSchema,
    errors: ['not-found'],
    handle: ({ deps }) => readSetUp(deps.reads.manager, deps.now()),
  }),
  route({
    method: 'post',
    path: '/set-up/recalculate',
    permission: 'mill.manage',
    summary:
      'States closed shifts from a date on again with what is now in force; a new signed version beside the old.',
    body: recalculateSchema,
    answer: recalculatedSchema,
    errors: ['bad-request', 'other-shed'],
    handle: ({ deps, principal, body }) => recalculate(deps, principal, body),
  }),
  ...goodsRoutes,
  ...loomRoutes,
  ...patternRoutes,
  ...changeRecordRoutes,
];
