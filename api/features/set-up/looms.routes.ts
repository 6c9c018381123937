import {
  alleyFormSchema,
  loomUntilSchema,
  moveLoomsSchema,
  newLoomsSchema,
  newLoomVersionsSchema,
  shedFormSchema,
} from '../../../shared/contract/set-up.js';
import type { Route } from '../route.js';
import { changeAlley } from './alleys.service.js';
import { changeRoute, changeThingRoute } from './change-route.js';
import { addLoomVersions } from './loom-versions.service.js';
import { addLooms, moveLooms, setLoomUntil } from './looms.service.js';
import { addShed, changeShed } from './sheds.service.js';

/** Sheds, the looms on their floor plan, and the alleys. */
export const loomRoutes: readonly Route[] = [
  changeRoute({ method: 'post', path: '/sheds', summary: 'A new shed.', body: shedFormSchema }, addShed),
  changeThingRoute(
    { method: 'patch', path: '/sheds/:id', summary: 'Gives a shed another name.', body: shedFormSchema },
    changeShed,
  ),
  changeRoute(
    { method: 'post', path: '/looms', summary: 'New looms on the plan of a shed.', body: newLoomsSchema },
    addLooms,
  ),
  changeRoute(
    {
      method: 'patch',
      path: '/looms',
      summary: 'Moves and renumbers looms, all or none.',
      body: moveLoomsSchema,
    },
    moveLooms,
  ),
  changeThingRoute(
    {
      method: 'patch',
      path: '/looms/:id/until',
      summary: 'Takes a loom out of use from a moment on; its history is kept.',
      body: loomUntilSchema,
    },
    (change, id, { until }) => setLoomUntil(change, id, until),
  ),
  changeRoute(
    {
      method: 'post',
      path: '/looms/versions',
      summary: 'Speed, reed space, clock, shuttles or battery of looms from a moment on.',
      body: newLoomVersionsSchema,
    },
    addLoomVersions,
  ),
  changeRoute(
    {
      method: 'patch',
      path: '/alleys',
      summary: 'The tacklers of an alley, and its name; its looms go with it.',
      body: alleyFormSchema,
    },
    changeAlley,
  ),
];
