import { TestBed, type ComponentFixture } from '@angular/core/testing';
import { Router, provideRouter } from '@angular/router';
import type { Pattern, PatternExamples, SetUp } from '@shared/contract/set-up';
import { json, problemResponse, StubServer } from '../../../testing/stub-server';
import { provideIcons } from '../../../ui/icons';
import { SetUpStore } from '../common/set-up-store';
import { Unsaved } from '../common/unsaved';
import { PatternPage } from './pattern-page';

const NIGHT: Pattern = {
  id: 'night',
  shedId: 'shed',
  name: 'Night',
  startsLocal: '22:00',
  endsLocal: '06:00',
  weekdays: [6],
  meal: null,
  from: null,
  until: null,
};
const SET_UP: SetUp = {
  mill: { name: 'Test', timeZone: 'Europe/London', units: 'metric' },
  sheds: [{ id: 'shed', name: 'Long shed' }],
  looms: [],
  loomVersions: [],
  alleys: [],
  cloths: [],
  clothVersions: [],
  beams: [],
  causeVersions: [],
  targets: [],
  parts: [],
  jobs: [],
  patterns: [NIGHT],
  calendar: [],
  shifts: [],
};
const EXAMPLES: PatternExamples = {
  examples: [
    {
      of: 'clocks-forward',
      date: '2027-03-27',
      startsAt: Date.parse('2027-03-27T22:00Z'),
      endsAt: Date.parse('2027-03-28T05:00Z'),
      minutes: 420,
    },
  ],
  overlaps: ['Late'],
};
const ASKED = '/api/set-up/patterns/examples';

// The first page of a run compiles its components: slow on a machine that does much else.
vi.setConfig({ testTimeout: 30_000 });

let server: StubServer;
let fixture: ComponentFixture<PatternPage>;

const says = (words: string): Promise<void> =>
  vi.waitFor(
    () => {
      fixture.detectChanges();
      expect((fixture.nativeElement as HTMLElement).textContent.replace(/\s+/g, ' ')).toContain(words);
    },
    { timeout: 5_000 },
  );

beforeEach(async () => {
  server = new StubServer();
  vi.stubGlobal('fetch', server.fetch);
  server.on('/api/set-up', () => json(SET_UP)).on(ASKED, () => json(EXAMPLES));
  TestBed.configureTestingModule({
    providers: [provideRouter([{ path: '**', children: [] }]), provideIcons(), SetUpStore, Unsaved],
  });
  await TestBed.inject(SetUpStore).reload();
  fixture = TestBed.createComponent(PatternPage);
  fixture.componentRef.setInput('id', 'night');
});

afterEach(() => {
  vi.unstubAllGlobals();
});

it('works out the nights on which the clocks change, against a usual one', async () => {
  await says('Sat, 22:00 to 06:00 the next day: 8 h, no meal.');
  await says('The clocks go forward');
  await says('Sat 27 Mar, 22:00 to 06:00 the next day');
  await says('7 h');
  await says('1 h less than usual');
  expect(server.countOf(ASKED)).toBe(1);
});

it('names what it overlaps, and asks so that the pattern whose place it takes is not among them', async () => {
  await says('It overlaps Late. Two shifts of one shed never run at once');
  const { body } = server.asked.find(({ path }) => path === ASKED) ?? {};
  expect(body).toMatchObject({ shedId: 'shed', patternId: 'night' });
  expect(body).toHaveProperty('from');
});

it('sends nothing of a pattern that is as it was', async () => {
  await says('Sat, 22:00 to 06:00 the next day');
  (fixture.nativeElement as HTMLElement).querySelector<HTMLButtonElement>('button[type="submit"]')?.click();
  await vi.waitFor(() => {
    expect(TestBed.inject(Router).url).toBe('/set-up/shifts?at=night');
  });
  expect(server.asked.filter(({ method }) => method === 'PATCH')).toEqual([]);
});

it('can be saved where the examples cannot be had', async () => {
  server.on(ASKED, () => problemResponse('busy'));
  await says('cannot be worked out just now. The pattern can be saved all the same.');
});
