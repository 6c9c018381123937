import {
  calendarDaySchema,
  changePatternSchema,
  dropCalendarDaySchema,
  endPatternSchema,
  newPatternSchema,
  patternExamplesRequestSchema,
  patternExamplesSchema,
} from '../../../shared/contract/set-up.js';
import { route, type Route } from '../route.js';
import { dropCalendarDay, setCalendarDay } from './calendar.service.js';
import { changeRoute, changeThingRoute } from './change-route.js';
import { patternExamples } from './pattern-examples.js';
import { addPattern, changePattern, endPattern } from './patterns.service.js';

/** Shift patterns and the calendar. Shifts that have no entry yet are made anew at once. */
export const patternRoutes: readonly Route[] = [
  changeRoute(
    {
      method: 'post',
      path: '/patterns',
      summary: 'A new shift pattern from a date on.',
      body: newPatternSchema,
    },
    addPattern,
  ),
  route({
    method: 'post',
    path: '/set-up/patterns/examples',
    permission: 'mill.manage',
    summary: 'Worked examples of a pattern as typed, over both changes of the clocks; changes nothing.',
    body: patternExamplesRequestSchema,
    answer: patternExamplesSchema,
    errors: ['bad-request', 'not-found'],
    handle: ({ deps, body }) => patternExamples(deps.reads.manager, body, deps.now()),
  }),
  changeThingRoute(
    {
      method: 'patch',
      path: '/patterns/:id',
      summary: 'A pattern is otherwise from a date on.',
      body: changePatternSchema,
    },
    changePattern,
  ),
  changeThingRoute(
    {
      method: 'post',
      path: '/patterns/:id/end',
      summary: 'A pattern is no more from a date on.',
      body: endPatternSchema,
    },
    endPattern,
  ),
  changeRoute(
    {
      method: 'post',
      path: '/calendar',
      summary: 'A day off, a short day or overtime; takes the place of what was said of the same.',
      body: calendarDaySchema,
    },
    setCalendarDay,
  ),
  changeRoute(
    {
      method: 'post',
      path: '/calendar/drop',
      summary: 'A date is as the patterns say again.',
      body: dropCalendarDaySchema,
      errors: ['not-found'],
    },
    dropCalendarDay,
  ),
];
