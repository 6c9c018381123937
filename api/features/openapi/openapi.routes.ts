import * as z from 'zod/mini';
import { route, type Route } from '../route.js';
import { describeRoutes } from './describe-routes.js';

export const openapiSchema = z.looseObject({
  openapi: z.string(),
  info: z.looseObject({ title: z.string(), version: z.string() }),
  paths: z.record(z.string(), z.unknown()),
});

/** The description of all routes, itself included. */
export function openapiRoutes(others: readonly Route[]): Route[] {
  let document: z.infer<typeof openapiSchema> | null = null;
  const own: Route[] = [
    route({
      method: 'get',
      path: '/openapi.json',
      permission: 'public',
      summary: 'This description of the API (OpenAPI 3.1), made from the schemas that the server checks by.',
      answer: openapiSchema,
      handle: async () => (document ??= describeRoutes([...others, ...own])),
    }),
  ];
  return own;
}
