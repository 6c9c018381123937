import { setUpDesk, type SetUpDesk } from '../../testing/set-up-desk.js';
import { HOUR } from '../../testing/test-entries.js';
import { MILL_SINCE, TEST_NOW, testServer, type TestServer } from '../../testing/test-server.js';

const FACTS = {
  ppm: 200,
  reedSpaceCm: 190,
  clock: { kind: 'continuous', unit: 100, digits: 5 },
  shuttles: 1,
  battery: false,
};
const place = (number: number, more: object = {}) => ({
  number,
  row: 3,
  position: number,
  alley: 'B',
  ...more,
});
const looms = (places: object[], more: object = {}) => ({
  shedId: 'north',
  from: TEST_NOW,
  places,
  facts: FACTS,
  ...more,
});

describe('sheds, looms and alleys', () => {
  let server: TestServer;
  let desk: SetUpDesk;
  beforeEach(async () => {
    server = await testServer();
    desk = await setUpDesk(server);
  });
  afterEach(() => server.close());

  it('makes a shed and gives it another name', async () => {
    const [id = ''] = await desk.change('post', '/sheds', { name: 'New shed' });
    await desk.change('patch', `/sheds/${id}`, { name: 'Weaving shed' });
    expect((await desk.read()).sheds).toContainEqual({ id, name: 'Weaving shed' });
  });

  it('sets up 24 looms at once; what is said of them holds from the beginning', async () => {
    const places = Array.from({ length: 24 }, (_, i) =>
      place(11 + i, { row: 3 + Math.floor(i / 6), position: (i % 6) + 1 }),
    );
    const ids = await desk.change('post', '/looms', looms(places));
    expect(ids).toHaveLength(24);
    const mill = await desk.read();
    expect(mill.looms.find(({ id }) => id === ids[7])).toEqual({
      id: ids[7],
      shedId: 'north',
      ...places[7],
      from: TEST_NOW,
      until: null,
    });
    const version = mill.loomVersions.find(({ loomId }) => loomId === ids[7]);
    expect(version).toMatchObject(FACTS);
    expect(version?.effectiveAt).toBeLessThan(MILL_SINCE);
  });

  it('lets looms change places and numbers, history going with them', async () => {
    const at = (id: string, number: number, position: number) => ({
      id,
      ...place(number, { row: 1, position, alley: 'A' }),
    });
    await desk.change('patch', '/looms', { looms: [at('n1', 2, 2), at('n2', 1, 1)] });
    const { looms: all } = await desk.read();
    expect(all.find(({ id }) => id === 'n1')).toMatchObject({ number: 2, position: 2, from: MILL_SINCE });
    expect(all.find(({ id }) => id === 'n2')).toMatchObject({ number: 1, position: 1 });
  });

  it('takes a loom out of use; its number and place are free for another, which keeps it from coming back', async () => {
    await desk.change('patch', '/looms/n4/until', { until: TEST_NOW });
    const [id = ''] = await desk.change('post', '/looms', looms([place(4, { row: 2, position: 2 })]));
    expect((await desk.refused('patch', '/looms/n4/until', { until: null })).fields['until']).toMatch(
      /The shed has a loom 4 already/,
    );
    await desk.change('patch', `/looms/${id}/until`, { until: TEST_NOW + HOUR });
    expect((await desk.read()).looms.find((one) => one.id === 'n4')?.until).toBe(TEST_NOW);
  });

  it('changes what is said of looms from a moment on, and leaves what is not said', async () => {
    const from = TEST_NOW - 24 * HOUR;
    const ids = await desk.change('post', '/looms/versions', {
      loomIds: ['n1', 'n2'],
      effectiveAt: from,
      facts: { ppm: 210 },
    });
    expect(ids).toHaveLength(2);
    const { loomVersions } = await desk.read();
    expect(loomVersions.filter(({ loomId }) => loomId === 'n1')).toEqual([
      { id: 'n1.1', loomId: 'n1', effectiveAt: MILL_SINCE, ...FACTS },
      { id: ids[0], loomId: 'n1', effectiveAt: from, ...FACTS, ppm: 210 },
    ]);
    const again = { loomIds: ['n1'], effectiveAt: from, facts: { ppm: 210 } };
    expect(await desk.change('post', '/looms/versions', again)).toEqual([]);
    // A second word on the same moment takes the place of the first, which stays on record.
    const [later = ''] = await desk.change('post', '/looms/versions', { ...again, facts: { ppm: 220 } });
    expect(later > (ids[0] ?? '')).toBe(true);
  });

  it('names an alley’s tacklers, and takes its looms along to another name', async () => {
    await desk.change('patch', '/alleys', {
      shedId: 'north',
      name: 'A',
      newName: 'Window side',
      tacklerIds: ['tom'],
    });
    const mill = await desk.read();
    expect(mill.alleys).toContainEqual({ shedId: 'north', name: 'Window side', tacklerIds: ['tom'] });
    expect(mill.alleys).toContainEqual({ shedId: 'south', name: 'A', tacklerIds: [] });
    expect(mill.looms.filter(({ alley }) => alley === 'Window side')).toHaveLength(4);
  });

  const wrong: [string, 'post' | 'patch', string, object, Record<string, RegExp>][] = [
    ['a shed without a name', 'post', '/sheds', { name: ' ' }, { name: /Too small/ }],
    [
      'a shed of a name that another has',
      'post',
      '/sheds',
      { name: 'The south shed' },
      { name: /Another shed is called The south shed/ },
    ],
    ['another shed’s name', 'patch', '/sheds/north', { name: 'The south shed' }, { name: /Another shed/ }],
    ['looms of no shed', 'post', '/looms', looms([place(9)], { shedId: 'west' }), { shedId: /no such shed/ }],
    ['no looms', 'post', '/looms', looms([]), { places: /Too small/ }],
    [
      'a number that is taken',
      'post',
      '/looms',
      looms([place(9), place(4)]),
      { 'places.1.number': /has a loom 4 already/ },
    ],
    [
      'a number twice',
      'post',
      '/looms',
      looms([place(9), place(9, { position: 2 })]),
      {
        'places.0.number': /has a loom 9 already/,
        'places.1.number': /has a loom 9 already/,
      },
    ],
    [
      'a place that is taken',
      'post',
      '/looms',
      looms([place(9, { row: 2, position: 1 })]),
      {
        'places.0.position': /Loom 3 stands in row 2 at place 1/,
      },
    ],
    [
      'a clock too narrow for a shift',
      'post',
      '/looms',
      looms([place(9)], { facts: { ...FACTS, clock: { ...FACTS.clock, unit: 1, digits: 4 } } }),
      {
        'facts.clock': /begins again after 10,000 picks.*8 h can have 96,000 at 200 picks\/min.*more digits/,
      },
    ],
    [
      'a speed of nothing',
      'post',
      '/looms',
      looms([place(9)], { facts: { ...FACTS, ppm: 0 } }),
      { 'facts.ppm': /Too small/ },
    ],
    [
      'a move on to another loom',
      'patch',
      '/looms',
      { looms: [{ id: 'n1', ...place(1, { row: 1, position: 2 }) }] },
      {
        'looms.0.position': /Loom 2 stands in row 1 at place 2/,
      },
    ],
    [
      'a move of no loom',
      'patch',
      '/looms',
      { looms: [{ id: 'n9', ...place(9) }] },
      { 'looms.0.id': /no such loom/ },
    ],
    [
      'a move twice',
      'patch',
      '/looms',
      {
        looms: [
          { id: 'n1', ...place(8) },
          { id: 'n1', ...place(9) },
        ],
      },
      { looms: /twice/ },
    ],
    [
      'an end before the beginning',
      'patch',
      '/looms/n1/until',
      { until: MILL_SINCE - HOUR },
      {
        until: /Loom 1 is in the shed since 1 Jan 2026, 00:00/,
      },
    ],
    [
      'a version of no loom',
      'post',
      '/looms/versions',
      { loomIds: ['n1', 'n9'], effectiveAt: TEST_NOW, facts: { ppm: 210 } },
      {
        'loomIds.1': /no such loom/,
      },
    ],
    [
      'a version that says nothing',
      'post',
      '/looms/versions',
      { loomIds: ['n1'], effectiveAt: TEST_NOW, facts: {} },
      {
        facts: /Say what is to change/,
      },
    ],
    [
      'a version with a narrow clock',
      'post',
      '/looms/versions',
      {
        loomIds: ['n1'],
        effectiveAt: TEST_NOW,
        facts: { clock: { kind: 'continuous', unit: 1, digits: 4 } },
      },
      {
        'facts.clock': /Loom 1: This clock begins again/,
      },
    ],
    [
      'an alley of no shed',
      'patch',
      '/alleys',
      { shedId: 'west', name: 'A', tacklerIds: [] },
      { shedId: /no such shed/ },
    ],
    [
      'a weaver for an alley',
      'patch',
      '/alleys',
      { shedId: 'north', name: 'A', tacklerIds: ['tom', 'wanda'] },
      {
        'tacklerIds.1': /Wanda Test is no tackler/,
      },
    ],
    [
      'nobody for an alley',
      'patch',
      '/alleys',
      { shedId: 'north', name: 'A', tacklerIds: ['who'] },
      { 'tacklerIds.0': /no such person/ },
    ],
    [
      'another name for no alley',
      'patch',
      '/alleys',
      { shedId: 'north', name: 'Z', newName: 'Y', tacklerIds: [] },
      { name: /no such alley/ },
    ],
  ];
  it.each(wrong)('refuses %s and says what would be right', async (_what, method, path, body, fields) => {
    const before = await desk.read();
    const refusal = await desk.refused(method, path, body);
    expect(refusal.code).toBe('bad-request');
    expect(Object.keys(refusal.fields)).toEqual(Object.keys(fields));
    for (const [field, message] of Object.entries(fields)) expect(refusal.fields[field]).toMatch(message);
    expect(await desk.read()).toEqual(before);
  });

  it('knows of no other shed or loom', async () => {
    expect((await desk.refused('patch', '/sheds/west', { name: 'West' })).code).toBe('not-found');
    expect((await desk.refused('patch', '/looms/n9/until', { until: null })).code).toBe('not-found');
  });
});
