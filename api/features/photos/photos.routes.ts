import { raw, type Request, type Response } from 'express';
import * as z from 'zod/mini';
import { photoQuerySchema, photoSchema } from '../../../shared/contract/calls.js';
import { LIMITS } from '../../../shared/contract/limits.js';
import { refSchema } from '../../../shared/contract/primitives.js';
import { photoFolder } from '../../files/photo-files.js';
import { ApiError } from '../../middleware/api-error.js';
import { route, type Route } from '../route.js';
import { keepPhoto, photoFile } from './photos.service.js';

export const photoRoutes: Route[] = [
  route({
    method: 'post',
    path: '/photos/:id',
    // As entries: a tablet sends what it holds, whoever is signed in there by then.
    permission: 'entries.push',
    summary:
      'A photo of a repair: the picture is the body (JPEG, PNG or WebP). Sent again, it is the same photo.',
    params: z.object({ id: refSchema }),
    query: photoQuerySchema,
    answer: photoSchema,
    errors: ['photo-not-an-image', 'photo-too-large', 'photo-no-repair', 'photo-other'],
    handle: async ({ deps, principal, params, query, request, response }) => {
      if (!z.uuidv7().safeParse(params.id).success) throw new ApiError('photo-no-repair');
      const body = await readPictureBody(request, response);
      return keepPhoto(deps, principal, { id: params.id, repairId: query.repairId, body });
    },
  }),
  route({
    method: 'get',
    path: '/photos/:id',
    permission: 'calls.read',
    summary: 'A photo of a repair, as JPEG.',
    params: z.object({ id: refSchema }),
    errors: ['not-found', 'other-shed'],
    handle: async ({ deps, principal, params, response }) => {
      const file = await photoFile(deps, principal, params.id);
      const options = { root: photoFolder(deps.settings.dataDir), cacheControl: false, etag: false };
      await new Promise<void>((resolve, reject) =>
        response.type('image/jpeg').sendFile(file, options, (error?: Error & { status?: number }) => {
          if (!error) resolve();
          else reject(error.status === 404 ? new ApiError('not-found') : error);
        }),
      );
    },
  }),
];

const parsePicture = raw({ type: () => true, limit: LIMITS.photoBytes });

async function readPictureBody(request: Request, response: Response): Promise<Buffer> {
  await new Promise<void>((resolve, reject) => {
    parsePicture(request, response, (error?: unknown) => {
      const { type } = (error ?? {}) as { type?: string };
      if (type === 'entity.too.large') reject(new ApiError('photo-too-large'));
      else if (error === undefined) resolve();
      else reject(error);
    });
  });
  const body: unknown = request.body;
  if (!Buffer.isBuffer(body) || body.length === 0) throw new ApiError('photo-not-an-image');
  return body;
}
