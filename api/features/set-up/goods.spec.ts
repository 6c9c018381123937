import { entry, insertTestGrants } from '../../testing/test-entries.js';
import { setUpDesk, type SetUpDesk } from '../../testing/set-up-desk.js';
import { MILL_SINCE, TEST_NOW, testServer, type TestServer } from '../../testing/test-server.js';

const WEFT = { name: 'Cotton', tex: 30, share: 1, waste: 0.03, pernMassG: 26 };
const CLOTH = {
  ends: 2_400,
  picksPerCmOnLoom: 20,
  picksPerCmLoomState: 20.6,
  reedWidthCm: 105,
  crimp: 0.06,
  abreast: 1,
  wefts: [WEFT],
};
const BEAM = { name: 'B 17', clothId: 'calico', lengthM: 900, thrumM: 2 };
const CAUSE = { name: 'Wrong draft', group: 'warp', attendedBy: 'tackler', allowanceS: null, breakOf: null };
const TARGET = { efficiency: 0.85, warpBreaks: 3, weftBreaks: null };

describe('the mill, its cloths, beams, causes, targets, parts and jobs', () => {
  let server: TestServer;
  let desk: SetUpDesk;
  beforeEach(async () => {
    server = await testServer();
    desk = await setUpDesk(server);
  });
  afterEach(() => server.close());

  const gait = async (warpId: string) => {
    await server.deps.writer.write((tx) => insertTestGrants(tx));
    const sent = entry('warp-change', {
      who: 'tackler',
      loomId: 'n1',
      how: 'gaiting',
      warpId,
      clothId: 'calico',
      at: TEST_NOW - 1_000,
    });
    const body = { sentAt: server.clock.now, entries: [sent] };
    const answer = await server.call('post', '/sync/entries', { as: await server.tablet(), body });
    expect(answer.body.results).toMatchObject([{ result: 'stored' }]);
  };

  it('keeps what is said of the mill; its time zone stays', async () => {
    await desk.change('patch', '/mill', {
      name: 'Lower mill',
      units: 'imperial',
      figuresByPerson: 'foremen',
      lockAfterMinutes: 10,
    });
    expect((await desk.read()).mill).toEqual({
      name: 'Lower mill',
      timeZone: 'Europe/London',
      units: 'imperial',
      figuresByPerson: 'foremen',
      lockAfterMinutes: 10,
    });
    const pulled = await server.call('get', '/sync/changes', { as: await server.tablet() });
    expect(pulled.body.reference).toMatchObject({
      mill: { lockAfterMinutes: 10 },
      parts: [],
      jobs: [],
      targets: [],
    });
  });

  it('sets up a cloth, changes it from a moment on and retires it', async () => {
    const [id = ''] = await desk.change('post', '/cloths', { name: 'Drill', facts: CLOTH });
    await desk.change('post', `/cloths/${id}/versions`, {
      effectiveAt: TEST_NOW,
      facts: { ...CLOTH, crimp: 0.08 },
    });
    await desk.change('patch', `/cloths/${id}`, { name: 'Heavy drill', retired: true });
    const mill = await desk.read();
    expect(mill.cloths).toContainEqual({ id, name: 'Heavy drill', retired: true });
    const versions = mill.clothVersions.filter(({ clothId }) => clothId === id);
    expect(versions.map(({ effectiveAt, crimp }) => [effectiveAt < MILL_SINCE, crimp])).toEqual([
      [true, 0.06],
      [false, 0.08],
    ]);
    expect((await desk.refused('post', '/beams', { ...BEAM, clothId: id })).fields['clothId']).toMatch(
      /Heavy drill is no longer woven/,
    );
  });

  it('keeps beams in store, knows where they are, and removes only those that were on no loom', async () => {
    const [one = ''] = await desk.change('post', '/beams', BEAM);
    const [other = ''] = await desk.change('post', '/beams', { ...BEAM, name: 'B 18' });
    await gait(one);
    await desk.change('patch', `/beams/${one}`, { ...BEAM, lengthM: 950 });
    expect((await desk.read()).beams).toEqual(
      expect.arrayContaining([
        { id: one, ...BEAM, lengthM: 950, onLoomId: 'n1', used: true },
        { id: other, ...BEAM, name: 'B 18', onLoomId: null, used: false },
      ]),
    );
    const refused = await server.call('delete', `/set-up/beams/${one}`, { as: desk.actor });
    expect([refused.status, refused.body.detail]).toEqual([
      409,
      'B 17 has been on a loom, so the book keeps it. Nothing was changed.',
    ]);
    await desk.change('delete', `/beams/${other}`);
    expect((await desk.read()).beams.map(({ id }) => id)).toEqual([one]);
    await desk.change('post', '/cloths', { name: 'Drill', facts: CLOTH });
    const drill = (await desk.read()).cloths.find(({ name }) => name === 'Drill')?.id ?? '';
    expect(
      (await desk.refused('patch', `/beams/${one}`, { ...BEAM, clothId: drill })).fields['clothId'],
    ).toMatch(/Correct the warp change/);
    // Once it is off the loom, another beam may have its name.
    expect((await desk.refused('post', '/beams', BEAM)).fields['name']).toMatch(/is called B 17/);
  });

  it('adds causes and changes them from a moment on', async () => {
    const [causeId = ''] = await desk.change('post', '/causes', { facts: CAUSE });
    await desk.change('post', `/causes/${causeId}/versions`, {
      effectiveAt: TEST_NOW,
      facts: { ...CAUSE, name: 'Wrong drawing-in', allowanceS: 300 },
    });
    await desk.change('post', '/causes/warp-break/versions', {
      effectiveAt: MILL_SINCE,
      facts: { name: 'Warp break', group: 'warp', attendedBy: 'weaver', allowanceS: 75, breakOf: 'warp' },
    });
    const { causeVersions } = await desk.read();
    expect(causeVersions.filter((one) => one.causeId === causeId).map(({ name }) => name)).toEqual([
      'Wrong draft',
      'Wrong drawing-in',
    ]);
    // Of one moment: the later word comes after the shipped one, and so holds.
    const breaks = causeVersions.filter((one) => one.causeId === 'warp-break').map(({ id }) => id);
    expect(breaks).toEqual([...breaks].sort());
    expect(breaks[0]).toBe('warp-break.1');
  });

  it('sets targets, parts and jobs', async () => {
    await desk.change('post', '/targets', { clothId: 'calico', effectiveAt: TEST_NOW, facts: TARGET });
    const [part = ''] = await desk.change('post', '/parts', { name: 'Picker', retired: false });
    await desk.change('patch', `/parts/${part}`, { name: 'Picker, buffalo', retired: false });
    const [job = ''] = await desk.change('post', '/jobs', {
      name: 'Oil',
      everyPicks: 500_000,
      retired: false,
    });
    await desk.change('patch', `/jobs/${job}`, { name: 'Oil', everyPicks: 400_000, retired: true });
    const mill = await desk.read();
    expect(mill.targets).toEqual([
      { id: expect.any(String), clothId: 'calico', effectiveAt: TEST_NOW, ...TARGET },
    ]);
    expect(mill.parts).toEqual([{ id: part, name: 'Picker, buffalo', retired: false }]);
    expect(mill.jobs).toEqual([{ id: job, name: 'Oil', everyPicks: 400_000, retired: true }]);
  });

  const cloth = (facts: object, name = 'Drill') => ({ name, facts: { ...CLOTH, ...facts } });
  const MILL = { name: 'Mill', units: 'metric', figuresByPerson: 'own', lockAfterMinutes: 5 };
  const wrong: [string, 'post' | 'patch', string, object, Record<string, RegExp>][] = [
    ['a mill without a name', 'patch', '/mill', { ...MILL, name: '' }, { name: /Too small/ }],
    [
      'a lock after no time',
      'patch',
      '/mill',
      { ...MILL, lockAfterMinutes: 0 },
      { lockAfterMinutes: /Too small/ },
    ],
    [
      'a cloth of a name that another has',
      'post',
      '/cloths',
      cloth({}, 'calico'),
      { name: /is called Calico/ },
    ],
    [
      'wefts that are not all',
      'post',
      '/cloths',
      cloth({ wefts: [{ ...WEFT, share: 0.75 }] }),
      {
        'facts.wefts': /add up to 0.75\. Together they must be 1/,
      },
    ],
    ['no weft', 'post', '/cloths', cloth({ wefts: [] }), { 'facts.wefts': /Too small/ }],
    [
      'a cloth without picks',
      'post',
      '/cloths',
      cloth({ picksPerCmOnLoom: 0 }),
      { 'facts.picksPerCmOnLoom': /Too small/ },
    ],
    [
      'a crimp above 1',
      'post',
      '/cloths/calico/versions',
      { effectiveAt: TEST_NOW, facts: { ...CLOTH, crimp: 6 } },
      {
        'facts.crimp': /Too big/,
      },
    ],
    [
      'a version before the year 2000',
      'post',
      '/cloths/calico/versions',
      { effectiveAt: 0, facts: CLOTH },
      { effectiveAt: /Too small/ },
    ],
    ['a beam of no cloth', 'post', '/beams', { ...BEAM, clothId: 'velvet' }, { clothId: /no such cloth/ }],
    [
      'a thrum longer than the warp',
      'post',
      '/beams',
      { ...BEAM, thrumM: 900 },
      { thrumM: /less than its 900 m/ },
    ],
    ['a beam without length', 'post', '/beams', { ...BEAM, lengthM: 0 }, { lengthM: /Too small/ }],
    [
      'a cause of a name that another has',
      'post',
      '/causes',
      { facts: { ...CAUSE, name: 'warp BREAK' } },
      {
        'facts.name': /is called Warp break/,
      },
    ],
    [
      'a weft break among the warp’s causes',
      'post',
      '/causes',
      { facts: { ...CAUSE, breakOf: 'weft' } },
      {
        'facts.breakOf': /belongs to the group weft/,
      },
    ],
    [
      'a negative allowance',
      'post',
      '/causes',
      { facts: { ...CAUSE, allowanceS: -1 } },
      { 'facts.allowanceS': /Too small/ },
    ],
    [
      'pern changes among planned stops',
      'post',
      '/causes/pern-change/versions',
      {
        effectiveAt: TEST_NOW,
        facts: { name: 'Pern change', group: 'planned', attendedBy: 'weaver', allowanceS: 15, breakOf: null },
      },
      { 'facts.group': /Pern change stays in its group/ },
    ],
    [
      'a target of no cloth',
      'post',
      '/targets',
      { clothId: 'velvet', effectiveAt: TEST_NOW, facts: TARGET },
      { clothId: /no such cloth/ },
    ],
    [
      'an efficiency in per cent',
      'post',
      '/targets',
      { clothId: 'calico', effectiveAt: TEST_NOW, facts: { ...TARGET, efficiency: 85 } },
      {
        'facts.efficiency': /Too big/,
      },
    ],
    ['a part without a name', 'post', '/parts', { name: '', retired: false }, { name: /Too small/ }],
    [
      'a job due at every pick',
      'post',
      '/jobs',
      { name: 'Oil', everyPicks: 1, retired: false },
      { everyPicks: /Too small/ },
    ],
  ];
  it.each(wrong)('refuses %s and says what would be right', async (_what, method, path, body, fields) => {
    const before = await desk.read();
    const refusal = await desk.refused(method, path, body);
    expect(refusal.code).toBe('bad-request');
    expect(Object.keys(refusal.fields)).toEqual(Object.keys(fields));
    for (const [field, message] of Object.entries(fields)) expect(refusal.fields[field]).toMatch(message);
    expect(await desk.read()).toEqual(before);
    expect(await desk.record()).toEqual([]);
  });

  it('refuses a part or a job twice, and knows of no other thing', async () => {
    await desk.change('post', '/parts', { name: 'Picker', retired: false });
    await desk.change('post', '/jobs', { name: 'Oil', everyPicks: 500_000, retired: false });
    expect((await desk.refused('post', '/parts', { name: 'picker', retired: false })).fields['name']).toMatch(
      /Another part/,
    );
    expect(
      (await desk.refused('post', '/jobs', { name: 'Oil', everyPicks: 1_000, retired: false })).fields[
        'name'
      ],
    ).toMatch(/Another job/);
    const asks: ['post' | 'patch', string, object][] = [
      ['patch', '/cloths/no-such', { name: 'X', retired: false }],
      ['post', '/cloths/no-such/versions', { effectiveAt: TEST_NOW, facts: CLOTH }],
      ['patch', '/beams/no-such', BEAM],
      ['post', '/causes/no-such/versions', { effectiveAt: TEST_NOW, facts: CAUSE }],
      ['patch', '/parts/no-such', { name: 'X', retired: false }],
      ['patch', '/jobs/no-such', { name: 'X', everyPicks: 1_000, retired: false }],
    ];
    for (const [method, path, body] of asks)
      expect((await desk.refused(method, path, body)).code).toBe('not-found');
  });
});
