import { signal } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { Subject } from 'rxjs';
import type { Answer } from './answer';
import { reportLoad } from './report-load';

const OFFLINE: Answer<string> = { kind: 'offline', why: 'no-network' };

function problem(status: number, code: 'internal' | 'not-permitted' | 'not-found'): Answer<string> {
  const told = { type: 'about:blank', title: code, status, code };
  return { kind: 'problem', status, code, problem: told, retryAfter: null };
}

/** A report whose answers the spec gives by hand. */
function bed() {
  const query = signal<string | null>(null);
  const again = new Subject<void>();
  const asked: { query: string; signal: AbortSignal; answer: (answer: Answer<string>) => Promise<void> }[] =
    [];
  const load = TestBed.runInInjectionContext(() =>
    reportLoad(
      query,
      again,
      (one, given) =>
        new Promise<Answer<string>>((resolve) => {
          const answer = async (answer: Answer<string>) => {
            resolve(answer);
            await Promise.resolve();
            await Promise.resolve();
          };
          asked.push({ query: one, signal: given, answer });
        }),
    ),
  );
  const ask = (next: string) => {
    query.set(next);
    TestBed.tick();
  };
  return { asked, again, ask, load, last: () => asked[asked.length - 1]! };
}

describe('reportLoad', () => {
  it('asks nothing until there is a question, then loads, then shows', async () => {
    const { asked, ask, load, last } = bed();
    TestBed.tick();
    expect(asked).toHaveLength(0);
    ask('week 1');
    expect(load()).toMatchObject({ state: 'loading', value: null });
    await last().answer({ kind: 'ok', body: 'figures' });
    expect(load()).toMatchObject({ state: 'ready', value: 'figures' });
  });

  it('keeps what it shows while it asks again, and when the server is gone', async () => {
    const { again, ask, load, last } = bed();
    ask('week 1');
    await last().answer({ kind: 'ok', body: 'figures' });
    again.next();
    expect(load()).toMatchObject({ state: 'ready', value: 'figures' });
    await last().answer(OFFLINE);
    expect(load()).toMatchObject({ state: 'offline', value: 'figures' });
    again.next();
    await last().answer(problem(500, 'internal'));
    expect(load()).toMatchObject({ state: 'failed', value: 'figures' });
    expect(load().sentence).toContain('safe');
  });

  it('shows nothing of one question as the answer to another, and gives up the one before', async () => {
    const { asked, ask, load, last } = bed();
    ask('week 1');
    await last().answer({ kind: 'ok', body: 'figures' });
    ask('week 2');
    expect(load()).toMatchObject({ state: 'loading', value: null });
    ask('week 3');
    expect(asked[1]?.signal.aborted).toBe(true);
    await asked[1]?.answer({ kind: 'ok', body: 'late' });
    expect(load()).toMatchObject({ state: 'loading', value: null });
    await last().answer(OFFLINE);
    expect(load()).toMatchObject({ state: 'offline', value: null });
  });

  it('takes away what a person may not see any more', async () => {
    const { again, ask, load, last } = bed();
    ask('week 1');
    await last().answer({ kind: 'ok', body: 'figures' });
    again.next();
    await last().answer(problem(403, 'not-permitted'));
    expect(load()).toMatchObject({ state: 'not-permitted', value: null });
    again.next();
    await last().answer(problem(404, 'not-found'));
    expect(load()).toMatchObject({ state: 'not-found', value: null });
  });
});
