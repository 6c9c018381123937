import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import sharp from 'sharp';
import request from 'supertest';
import { v7 as uuid } from 'uuid';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { LIMITS } from '../../../shared/contract/limits.js';
import { TEST_NOW, testServer, type SignedInActor, type TestServer } from '../../testing/test-server.js';

/** A picture as a camera writes it: lying on its side, with where and by what it was taken. */
function fromCamera(width = 400, height = 200): Promise<Buffer> {
  return sharp({ create: { width, height, channels: 3, background: '#884422' } })
    .jpeg()
    .withExif({
      IFD0: { Make: 'Shedcam', Orientation: '6' },
      IFD3: {
        GPSLatitudeRef: 'N',
        GPSLatitude: '53/1 45/1 0/1',
        GPSLongitudeRef: 'W',
        GPSLongitude: '2/1 14/1 0/1',
      },
    })
    .withMetadata({ orientation: 6 })
    .toBuffer();
}

describe('photos of repairs', () => {
  let server: TestServer;
  let tackler: SignedInActor;
  let seq = 0;
  beforeEach(async () => {
    server = await testServer();
    tackler = await server.signInAs('tackler');
  });
  afterEach(() => server.close());

  const send = (id: string, repairId: string, body: Buffer, as: SignedInActor | null = tackler) => {
    const test = request(server.app)
      .post(`/api/photos/${id}`)
      .query({ repairId })
      .set('Content-Type', 'image/jpeg');
    return (as ? test.set('Authorization', as.authorization) : test).send(body);
  };
  /** A repair in the book that names photos; its id. */
  const repair = async (...photoIds: string[]): Promise<string> => {
    const { person, grant } = tackler.session;
    const id = uuid();
    const { body } = await server.call('post', '/sync/entries', {
      as: tackler,
      body: {
        sentAt: TEST_NOW,
        entries: [
          {
            id,
            schema: 2,
            kind: 'repair',
            shedId: 'north',
            loomId: 'n1',
            at: TEST_NOW,
            recordedAt: TEST_NOW,
            by: person?.id,
            grantId: grant?.id,
            deviceId: grant?.deviceId,
            deviceSeq: (seq += 1),
            source: 'tap',
            cause: 'picking',
            photoIds,
          },
        ],
      },
    });
    expect(body.results).toMatchObject([{ result: 'stored' }]);
    return id;
  };
  const kept = () => readdirSync(join(server.deps.settings.dataDir, 'photos'));

  it('are kept upright and small, without what the camera says of place and make', async () => {
    const sent = await fromCamera(4_000, 2_000);
    expect((await sharp(sent).metadata()).exif?.toString('latin1')).toContain('Shedcam');
    const id = uuid();
    const repairId = await repair(uuid(), id);
    const answer = await send(id, repairId, sent);
    expect(answer.body).toMatchObject({ id, place: 1, width: 800, height: LIMITS.photoSide });
    const [name = ''] = kept();
    expect(name).toMatch(/^[0-9a-f-]{36}\.jpg$/);
    expect(name).not.toContain(id);
    const file = readFileSync(join(server.deps.settings.dataDir, 'photos', name));
    const { exif, xmp, iptc, orientation, format } = await sharp(file).metadata();
    expect({ exif, xmp, iptc, orientation, format }).toEqual({ format: 'jpeg' });
    expect(file.includes('Shedcam')).toBe(false);
  });

  it('are shown to who may see calls, to nobody else', async () => {
    const id = uuid();
    await send(id, await repair(id), await fromCamera()).expect(200);
    const got = await server.call('get', `/photos/${id}`, { as: await server.signInAs('foreman') });
    expect([got.status, got.type, got.get('Cache-Control')]).toEqual([200, 'image/jpeg', 'no-store']);
    expect(await sharp(got.body as Buffer).metadata()).toMatchObject({ width: 200, height: 400 });
    expect((await server.call('get', `/photos/${id}`)).body).toMatchObject({ code: 'not-signed-in' });
    expect((await server.call('get', `/photos/${id}`, { as: await server.signInAs('weaver') })).status).toBe(
      403,
    );
    expect(
      (await server.call('get', `/photos/${id}`, { as: await server.signInAs('southForeman') })).body,
    ).toMatchObject({ code: 'other-shed' });
  });

  it('sent again are the same; another under the number is refused', async () => {
    const id = uuid();
    const repairId = await repair(id);
    const picture = await fromCamera();
    const [first, second] = await Promise.all([send(id, repairId, picture), send(id, repairId, picture)]);
    expect(second.body).toEqual(first.body);
    expect((await send(id, repairId, picture)).body).toEqual(first.body);
    expect(kept()).toHaveLength(1);
    expect((await send(id, repairId, await fromCamera(50, 50))).body).toMatchObject({ code: 'photo-other' });
  });

  it('wait for the repair that names them', async () => {
    const id = uuid();
    const picture = await fromCamera();
    expect((await send(id, uuid(), picture)).body).toMatchObject({ status: 409, code: 'photo-no-repair' });
    expect((await send(id, await repair(uuid()), picture)).body).toMatchObject({ code: 'photo-no-repair' });
    expect((await send(id, await repair(id), picture)).status).toBe(200);
  });

  it('come from the device that logged the repair', async () => {
    const id = uuid();
    const repairId = await repair(id);
    const desk = await server.signInAs('foreman');
    expect((await send(id, repairId, await fromCamera(), desk)).body).toMatchObject({
      code: 'not-permitted',
    });
    // Whoever is signed in there by then, or nobody.
    expect((await send(id, repairId, await fromCamera(), await server.tablet('north'))).status).toBe(200);
    expect((await send(id, repairId, await fromCamera(), null)).status).toBe(401);
  });

  it.each([
    ['words', Buffer.from('not a picture at all'), 415, 'photo-not-an-image'],
    ['nothing', Buffer.alloc(0), 415, 'photo-not-an-image'],
    [
      'a drawing that runs programs',
      Buffer.from('<svg xmlns="http://www.w3.org/2000/svg"><script/></svg>'),
      415,
      'photo-not-an-image',
    ],
    ['half a picture', null, 415, 'photo-not-an-image'],
    ['more than is taken', Buffer.alloc(LIMITS.photoBytes + 1, 1), 413, 'photo-too-large'],
  ] as const)('%s is no photo', async (_what, body, status, code) => {
    const id = uuid();
    const repairId = await repair(id);
    const picture = await fromCamera();
    const sent = body ?? picture.subarray(0, Math.floor(picture.length * 0.8));
    const answer = await send(id, repairId, sent);
    expect([answer.status, answer.body.code]).toEqual([status, code]);
    expect(readdirSync(server.deps.settings.dataDir)).not.toContain('photos');
    expect((await send(id, repairId, picture)).status).toBe(200);
  });

  it('of more pixels than can be decoded are refused before they are', async () => {
    const id = uuid();
    const bomb = await sharp({ create: { width: 8_000, height: 6_000, channels: 3, background: '#fff' } })
      .png({ compressionLevel: 9 })
      .toBuffer();
    expect(bomb.length).toBeLessThan(LIMITS.photoBytes);
    expect((await send(id, await repair(id), bomb)).body).toMatchObject({ code: 'photo-too-large' });
  });

  it('are six of a repair at most', async () => {
    const { person, grant } = tackler.session;
    const { body } = await server.call('post', '/sync/entries', {
      as: tackler,
      body: {
        sentAt: TEST_NOW,
        entries: [
          {
            ...{ id: uuid(), schema: 2, kind: 'repair', shedId: 'north', loomId: 'n1', at: TEST_NOW },
            ...{ recordedAt: TEST_NOW, by: person?.id, grantId: grant?.id, deviceId: grant?.deviceId },
            ...{ deviceSeq: 90, source: 'tap', cause: 'picking' },
            photoIds: Array.from({ length: 7 }, () => uuid()),
          },
        ],
      },
    });
    expect(body.results).toMatchObject([{ result: 'refused', code: 'entry-malformed' }]);
  });
});
