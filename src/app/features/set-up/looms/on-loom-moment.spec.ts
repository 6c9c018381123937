import { momentOnLoom, onLoomTrouble } from './on-loom-moment';

const at = (text: string) => Date.parse(text);
const NOW = at('2026-12-01T12:00Z');
const loom = (number: number, from: string, until: string | null = null) => ({
  number,
  from: at(from),
  until: until === null ? null : at(until),
});
const OLD = loom(1, '2026-01-05T06:00Z');
const NEW = loom(3, '2026-12-01T06:00Z');
const THEN = 'Say that moment or a later one.';

it.each([
  ['now', '2026-12-01T12:00Z', [OLD, NEW], ''],
  ['as it came', '2026-12-01T06:00Z', [NEW], ''],
  ['before it came', '2026-12-01T05:00Z', [NEW], `Loom 3 is in the shed from 1 Dec 2026, 06:00. ${THEN}`],
  [
    'before one of them came',
    '2026-11-30T06:00Z',
    [OLD, NEW],
    `Loom 3 is in the shed from 1 Dec 2026, 06:00. ${THEN}`,
  ],
  [
    'before many came',
    '2026-11-30T06:00Z',
    [NEW, loom(4, '2026-12-01T08:00Z'), ...[5, 6, 7].map((number) => loom(number, '2026-12-01T06:00Z'))],
    `Loom 3 is in the shed from 1 Dec 2026, 06:00; loom 4 from 1 Dec 2026, 08:00; loom 5 from 1 Dec 2026, 06:00; 2 more are like that. ${THEN}`,
  ],
  [
    'before a loom that is to come',
    '2026-12-01T12:00Z',
    [loom(8, '2026-12-07T06:00Z')],
    `Loom 8 is in the shed from 7 Dec 2026, 06:00. ${THEN}`,
  ],
  [
    'after it has gone',
    '2026-12-01T11:00Z',
    [loom(9, '2026-01-05T06:00Z', '2026-12-01T10:00Z')],
    'Loom 9 is in the shed until 1 Dec 2026, 10:00. Say a moment before.',
  ],
  ['within the clock’s tolerance', '2026-12-01T12:02Z', [OLD], ''],
  [
    'in the future',
    '2026-12-01T12:03Z',
    [OLD],
    'That is still to come. Say since when it has been on the loom: now, or before.',
  ],
  ['35 days ago', '2026-10-27T12:00Z', [OLD], ''],
  ['longer ago', '2026-10-27T11:59Z', [OLD], 'The book goes back 35 days: say 27 Oct 2026, 12:01 or later.'],
])('%s', (_what, moment, looms, sentence) => {
  expect(onLoomTrouble(at(moment), looms, NOW, 'UTC')).toBe(sentence);
});

it('takes the minute of its coming for its coming', () => {
  const placed = { ...NEW, from: at('2026-12-01T06:00:42Z') };
  expect(onLoomTrouble(at('2026-12-01T06:00Z'), [placed], NOW, 'UTC')).toBe('');
  expect(momentOnLoom(at('2026-12-01T06:00Z'), placed)).toBe(placed.from);
  expect(momentOnLoom(at('2026-12-01T05:59Z'), placed)).toBe(at('2026-12-01T05:59Z'));
  expect(onLoomTrouble(at('2026-12-01T05:59Z'), [placed], NOW, 'UTC')).not.toBe('');
});
