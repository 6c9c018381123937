import 'fake-indexeddb/auto';
import { rmSync } from 'node:fs';
import { planOf, ROUNDS, SERVER_EVENTS, TABLET_FAULTS, TAPS, WIRE_FAULTS } from './plan';
import { proveRuns } from './prove';
import { SABOTAGES, type SabotageName } from './sabotage';
import { templateMill } from './template-mill';

const RUNS = 50;
/** How many runs a sabotage may go unnoticed. */
const NOTICED = 12;

describe('what a tablet showed as saved is in the book exactly once', () => {
  let template: string;
  beforeAll(async () => {
    template = await templateMill();
  });
  afterAll(() => rmSync(template, { recursive: true, force: true }));

  it(`whatever happens between: ${RUNS} runs of three tablets with a hundred taps each`, async () => {
    const said: string[] = [];
    const proof = await proveRuns({ runs: RUNS, seed: 1, template, say: (line) => said.push(line) });
    expect(said).toEqual([]);
    expect(proof).toMatchObject({ runs: RUNS, lost: 0, doubled: 0, misattributed: 0, unseen: 0 });
    expect(proof.entries).toBeGreaterThan(RUNS * 290);
    expect(proof.faults).toBeGreaterThan(RUNS * 20);
  }, 400_000);

  it.each(Object.keys(SABOTAGES) as SabotageName[])(
    'and the proof notices %s',
    async (sabotage) => {
      const proof = await proveRuns({ runs: NOTICED, seed: 1, template, sabotage });
      expect(proof.lost + proof.doubled + proof.misattributed + proof.unseen).toBeGreaterThan(0);
    },
    200_000,
  );
});

describe('a schedule', () => {
  it('is the same for the same seed, another for another', () => {
    expect(planOf(7)).toEqual(planOf(7));
    expect(planOf(7)).not.toEqual(planOf(8));
  });

  it('has each tablet tap a hundred times, once something the book can never take', () => {
    const { rounds, wire } = planOf(3);
    expect(wire).toHaveLength(3);
    for (const tablet of [0, 1, 2]) {
      const acts = rounds.flatMap(({ turns }) => turns[tablet]?.taps ?? []).map(({ act }) => act);
      expect(acts).toHaveLength(ROUNDS * TAPS);
      expect(acts.filter((act) => act === 'poison')).toHaveLength(1);
    }
  });

  it('between them, fifty leave no fault out', () => {
    const drawn = new Set<string | null>();
    for (let seed = 1; seed <= RUNS; seed++) {
      const { rounds, wire } = planOf(seed);
      for (const fault of wire.flat()) drawn.add(fault);
      for (const { event, turns } of rounds) {
        drawn.add(event);
        for (const { fault } of turns) drawn.add(fault);
      }
    }
    for (const fault of [...WIRE_FAULTS, ...TABLET_FAULTS, ...SERVER_EVENTS]) expect(drawn).toContain(fault);
  });
});
