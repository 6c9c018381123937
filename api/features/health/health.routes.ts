import { healthSchema } from '../../../shared/contract/reports.js';
import { VERSION } from '../../version.js';
import { route } from '../route.js';

export const healthRoutes = [
  route({
    method: 'get',
    path: '/health',
    permission: 'public',
    summary: 'Whether the server is up, which book it has, and how many writes wait.',
    answer: healthSchema,
    handle: async ({ deps }) => ({
      status: deps.writer.closing ? 'closing-down' : 'ok',
      version: VERSION,
      serverNow: deps.now(),
      epoch: deps.epoch,
      writerWaiting: deps.writer.waiting,
    }),
  }),
];
