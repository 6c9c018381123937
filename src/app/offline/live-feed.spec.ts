import { VirtualTimeScheduler } from 'rxjs';
import { until } from '../testing/until';
import { liveFeed } from './live-feed';

function stream(...parts: string[]): Response {
  const body = new ReadableStream<Uint8Array>({
    start(controller) {
      for (const part of parts) controller.enqueue(new TextEncoder().encode(part));
      controller.close();
    },
  });
  return new Response(body, { headers: { 'content-type': 'text/event-stream' } });
}

function listen(answers: (() => Response)[]) {
  const scheduler = new VirtualTimeScheduler();
  const asked: RequestInit[] = [];
  const heard: number[] = [];
  const state: string[] = [];
  let token = 'old';
  const renew = vi.fn(() => {
    token = 'new';
    return Promise.resolve(true);
  });
  const feed = liveFeed({
    fetch: (_url, init) => {
      asked.push(init);
      const answer = answers.shift();
      return answer ? Promise.resolve(answer()) : new Promise(() => undefined);
    },
    url: '/api/sync/feed',
    token: () => token,
    renew,
    random: () => 0,
    scheduler,
    opened: () => state.push('opened'),
    heard: () => state.push('heard'),
    lost: () => state.push('lost'),
  });
  const subscription = feed.subscribe((seq) => heard.push(seq));
  return { asked, heard, renew, scheduler, state, subscription };
}

describe('liveFeed', () => {
  it('says each number, however the stream is cut up, and nothing of comments', async () => {
    const { heard, asked, subscription } = listen([
      () =>
        stream(
          ': hello\n\nevent: chan',
          'ged\ndata: {"seq"',
          ':7}\n\n:\n\nevent: changed\ndata: {"seq":9}\n\n',
        ),
    ]);
    await until(() => expect(heard).toEqual([7, 9]));
    expect(asked[0]?.headers).toMatchObject({ authorization: 'Bearer old', 'ngsw-bypass': 'true' });
    subscription.unsubscribe();
  });

  it('opens the stream again after it ended, later each time', async () => {
    const { asked, scheduler, subscription } = listen([() => stream(), () => stream()]);
    for (const [count, frame] of [
      [2, 250],
      [3, 750],
    ] as const) {
      await until(() => expect(scheduler.actions.length).toBe(1));
      scheduler.flush();
      expect(scheduler.frame).toBe(frame);
      await until(() => expect(asked).toHaveLength(count));
    }
    subscription.unsubscribe();
  });

  it('says when it is open, when it hears anything, and when it is lost', async () => {
    const { scheduler, state, subscription } = listen([() => stream(':\n\n')]);
    await until(() => expect(scheduler.actions.length).toBe(1));
    expect(state).toEqual(['heard', 'opened', 'heard', 'lost']);
    subscription.unsubscribe();
  });

  it('gets a new token once when the old one is refused', async () => {
    const { asked, heard, renew, subscription } = listen([
      () => new Response('{}', { status: 401 }),
      () => stream('event: changed\ndata: {"seq":3}\n\n'),
    ]);
    await until(() => expect(heard).toEqual([3]));
    expect(renew).toHaveBeenCalledOnce();
    expect(asked[1]?.headers).toMatchObject({ authorization: 'Bearer new' });
    subscription.unsubscribe();
  });

  it('hangs up when nobody listens any more', async () => {
    const { asked, subscription } = listen([]);
    subscription.unsubscribe();
    expect(asked[0]?.signal?.aborted).toBe(true);
  });

  it('does not take a page for a stream', async () => {
    const { heard, scheduler, subscription } = listen([
      () => new Response('event: changed\ndata: {"seq":1}\n\n', { headers: { 'content-type': 'text/html' } }),
    ]);
    await until(() => expect(scheduler.actions.length).toBe(1));
    expect(heard).toEqual([]);
    subscription.unsubscribe();
  });
});
