import * as z from 'zod/mini';
import { refSchema } from '../../../shared/contract/primitives.js';
import {
  beamFormSchema,
  changedSchema,
  clothFormSchema,
  jobFormSchema,
  millFormSchema,
  newCauseSchema,
  newCauseVersionSchema,
  newClothSchema,
  newClothVersionSchema,
  newTargetSchema,
  partFormSchema,
} from '../../../shared/contract/set-up.js';
import { route, type Route } from '../route.js';
import { addBeam, changeBeam, removeBeam } from './beams.service.js';
import { addCause, addCauseVersion } from './causes.service.js';
import { changeRoute, changeThingRoute } from './change-route.js';
import { addCloth, addClothVersion, addTarget, changeCloth } from './cloths.service.js';
import { changeMill } from './mill.service.js';
import { addJob, addPart, changeJob, changePart } from './parts-and-jobs.service.js';
import { changeSetUp } from './set-up-change.js';

/** What belongs to no shed: the mill itself, cloths and beams, causes, targets, parts, jobs. */
export const goodsRoutes: readonly Route[] = [
  changeRoute(
    {
      method: 'patch',
      path: '/mill',
      summary: 'Name, units, figures by person, when tablets lock.',
      body: millFormSchema,
    },
    changeMill,
  ),
  changeRoute({ method: 'post', path: '/cloths', summary: 'A new cloth.', body: newClothSchema }, addCloth),
  changeThingRoute(
    {
      method: 'patch',
      path: '/cloths/:id',
      summary: 'A cloth’s name, and whether it is offered.',
      body: clothFormSchema,
    },
    changeCloth,
  ),
  changeThingRoute(
    {
      method: 'post',
      path: '/cloths/:id/versions',
      summary: 'What a cloth is made of from a moment on.',
      body: newClothVersionSchema,
    },
    addClothVersion,
  ),
  changeRoute({ method: 'post', path: '/beams', summary: 'A beam in store.', body: beamFormSchema }, addBeam),
  changeThingRoute(
    { method: 'patch', path: '/beams/:id', summary: 'What is said of a beam.', body: beamFormSchema },
    changeBeam,
  ),
  route({
    method: 'delete',
    path: '/set-up/beams/:id',
    permission: 'mill.manage',
    summary: 'Removes a beam that was never on a loom.',
    params: z.object({ id: refSchema }),
    answer: changedSchema,
    errors: ['not-found', 'conflict'],
    handle: ({ deps, principal, params }) =>
      changeSetUp(deps, principal, (change) => removeBeam(change, params.id)),
  }),
  changeRoute(
    { method: 'post', path: '/causes', summary: 'A new cause of stops.', body: newCauseSchema },
    addCause,
  ),
  changeThingRoute(
    {
      method: 'post',
      path: '/causes/:id/versions',
      summary: 'A cause’s name, group, allowance and who attends from a moment on.',
      body: newCauseVersionSchema,
    },
    addCauseVersion,
  ),
  changeRoute(
    {
      method: 'post',
      path: '/targets',
      summary: 'What a cloth’s looms should reach from a moment on.',
      body: newTargetSchema,
    },
    addTarget,
  ),
  changeRoute(
    { method: 'post', path: '/parts', summary: 'A new spare part.', body: partFormSchema },
    addPart,
  ),
  changeThingRoute(
    {
      method: 'patch',
      path: '/parts/:id',
      summary: 'A part’s name, and whether it is offered.',
      body: partFormSchema,
    },
    changePart,
  ),
  changeRoute({ method: 'post', path: '/jobs', summary: 'A new job of care.', body: jobFormSchema }, addJob),
  changeThingRoute(
    { method: 'patch', path: '/jobs/:id', summary: 'What is said of a job of care.', body: jobFormSchema },
    changeJob,
  ),
];
