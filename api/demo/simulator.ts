import type { Shift, Warp } from '../../shared/contract/reference.js';
import { Daybook, type DemoPush } from './daybook.js';
import { closeShift, handOver, takeOver } from './hand-over.js';
import { type DemoMill } from './mill.js';
import { Mishaps } from './mishaps.js';
import type { DemoPerson } from './people.js';
import { Random } from './random.js';
import { type Crew, Shed } from './shed.js';
import { findWarps } from './warp-room.js';
import { DAY, drawLuck, HOUR, MINUTE, weaveUntil, WEEK } from './weaving.js';
import { sure } from './sure.js';

export interface SimulatorInput {
  readonly seed: number;
  readonly now: number;
  readonly mill: DemoMill;
  readonly people: readonly DemoPerson[];
  /** Shifts that have begun, oldest first; the last may be in progress. */
  readonly shifts: readonly Shift[];
  /** Pattern ids in the order of the day: the crews change through them week by week. */
  readonly patterns: readonly string[];
}

export interface Simulation {
  readonly warps: readonly Warp[];
  /** In the order in which the server gets them. */
  readonly pushes: readonly DemoPush[];
}

/**
 * Twelve weeks in a mill that is not there: the shed runs by chance, its people log what they see, and only what they
 * log comes out. No clock and no chance of its own: the same input gives the same entries.
 */
export function simulate(input: SimulatorInput): Simulation {
  const { now, shifts } = input;
  const random = new Random(input.seed);
  const daybook = new Daybook(random, now);
  const shed = new Shed(input.mill, random, daybook, now);
  const past = shifts.filter((shift) => shift.endsAt <= now);
  const current = shifts.find((shift) => shift.startsAt <= now && now < shift.endsAt) ?? null;
  const mishaps = new Mishaps(past, current);
  let endedAt: number | null = null;
  shifts.forEach((shift, i) => {
    const crew = crewOf(input, shift);
    shed.begin(shift, crew);
    if (endedAt === null) {
      findWarps(shed, crew.foreman, shift.startsAt);
      for (const loom of shed.looms) shed.start(loom, shift.startsAt);
    } else if (shift.startsAt > endedAt) shed.pause(endedAt, shift.startsAt);
    for (const loom of shed.looms) {
      drawLuck(loom, random);
      if (loom.running) shed.expectTrouble(loom, shift.startsAt);
    }
    takeOver(shed, shift, mishaps);
    planShift(shed, shift, i, shifts.length, random);
    mishaps.duringShift(shed, shift);
    runShift(shed, shift, Math.min(shift.endsAt, now));
    endedAt = shift.endsAt;
    if (shift.endsAt > now) return;
    handOver(shed, shift, mishaps);
    mishaps.afterShift(shed, shift);
    if (shift !== past[past.length - 1]) closeShift(shed, shift, crew.foreman, noteFor(i));
  });
  return { warps: shed.warps, pushes: daybook.pushes() };
}

/** The crews change patterns every week. */
export function crewOf(
  input: Pick<SimulatorInput, 'people' | 'patterns'>,
  shift: Pick<Shift, 'date' | 'patternId'>,
): Crew {
  const week = Math.floor((Date.parse(shift.date) - 4 * DAY) / WEEK);
  const turn = (input.patterns.indexOf(shift.patternId) + week) % 3;
  const crew = input.people.filter((person) => person.crew === turn);
  const one = (role: string): string => sure(crew.find((person) => person.role === role)).id;
  return {
    weavers: crew.filter((person) => person.role === 'weaver').map((person) => person.id),
    tackler: one('tackler'),
    foreman: one('foreman'),
  };
}

function runShift(shed: Shed, shift: Shift, until: number): void {
  const { meal } = shift;
  if (meal?.looms === 'stopped' && meal.startsAt < until) {
    shed.agenda.runUntil(meal.startsAt);
    shed.pause(meal.startsAt, meal.endsAt);
  }
  shed.agenda.runUntil(until);
  for (const loom of shed.looms) weaveUntil(loom, until);
}

/** What is meant to happen: cleaning, a loom without an order, maintenance, and one power cut. */
function planShift(shed: Shed, shift: Shift, i: number, of: number, random: Random): void {
  const { weavers, foreman } = shed.crew;
  for (const loom of shed.looms)
    if (random.chance(0.06))
      shed.standOnPurpose(
        loom,
        sure(weavers[loom.set]),
        'cleaning',
        shift.startsAt + random.between(0.5, 6.5) * HOUR,
        random.duration(16 * MINUTE, 0.25),
      );
  const loom = (number: number) => sure(shed.looms[number - 1]);
  if (i === of - 70) shed.standOnPurpose(loom(24), foreman, 'no-order', shift.startsAt + HOUR, 60 * HOUR);
  if (i === of - 45)
    shed.standOnPurpose(loom(5), foreman, 'maintenance', shift.startsAt + 2 * HOUR, 4 * HOUR);
  if (i === of - 24) shed.powerCut(shift.startsAt + 2.6 * HOUR, 38 * MINUTE);
}

function noteFor(i: number): string | null {
  const notes = [
    'Weft of Mere sheeting runs rough: winder told.',
    'Two baskets of perns short at the end of the shift.',
    'Loom 17 wants watching.',
    'Alley B swept; fan in row 3 is out.',
  ];
  return i % 11 === 3 ? (notes[Math.floor(i / 11) % notes.length] ?? null) : null;
}
