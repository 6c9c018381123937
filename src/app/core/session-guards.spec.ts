import { TestBed } from '@angular/core/testing';
import { Router, provideRouter } from '@angular/router';
import { aSession, json, StubServer } from '../testing/stub-server';
import { API } from './api-paths';
import { firstManagerGuard } from './session-guards';

/** Where a person ends who opens /first-run, by what the book says of the session. */
async function firstRunWith(over: Parameters<typeof aSession>[0]): Promise<string> {
  const server = new StubServer();
  server.on(API.refresh, () => json(aSession(over)));
  vi.stubGlobal('fetch', server.fetch);
  TestBed.configureTestingModule({
    providers: [
      provideRouter([
        { path: 'first-run', canActivate: [firstManagerGuard], children: [] },
        { path: '**', children: [] },
      ]),
    ],
  });
  const router = TestBed.inject(Router);
  await router.navigateByUrl('/first-run');
  return router.url;
}

describe('firstManagerGuard', () => {
  beforeEach(() => localStorage.clear());
  afterEach(() => vi.unstubAllGlobals());

  it('opens the first run while the mill has no manager', async () => {
    expect(await firstRunWith({ person: null, accessToken: null, needsFirstManager: true })).toBe(
      '/first-run',
    );
  });

  it('leads to sign-in where the mill is set up', async () => {
    expect(await firstRunWith({ person: null, accessToken: null })).toBe('/sign-in');
  });

  it('leads whoever is signed in to their work', async () => {
    expect(await firstRunWith({})).toBe('/');
  });
});
