import { until } from '../testing/until';
import { TabLead } from './tab-lead';

/** Web Locks of one browser: one holder a name, the others in a queue. */
class Locks {
  private readonly queue: (() => void)[] = [];
  private held = false;

  request(_name: string, options: LockOptions, callback: () => Promise<void>): Promise<void> {
    return new Promise((resolve, reject) => {
      const run = (): void => {
        this.held = true;
        void callback().then(() => {
          this.held = false;
          this.queue.shift()?.();
          resolve();
        });
      };
      options.signal?.addEventListener('abort', () => {
        const place = this.queue.indexOf(run);
        if (place >= 0) this.queue.splice(place, 1);
        reject(new DOMException('given up', 'AbortError'));
      });
      if (this.held) this.queue.push(run);
      else run();
    });
  }
}

function browser(locks: Locks | undefined = new Locks()) {
  const time = { now: 0 };
  const tab = () =>
    new TabLead({ locks: locks as unknown as LockManager, now: () => time.now, beat: () => undefined });
  return { time, tab };
}

describe('TabLead', () => {
  it('lets one tab lead, and the next when that is closed', async () => {
    const { tab } = browser();
    const [first, second] = [tab(), tab()];
    const led = vi.fn();
    second.onLead(led);
    first.start();
    second.start();
    expect([first.leads(), second.leads()]).toEqual([true, false]);
    first.stop();
    await until(() => expect(second.leads()).toBe(true));
    expect(led).toHaveBeenCalledOnce();
    second.stop();
  });

  it('does not wait for a leader that has fallen silent', () => {
    const { time, tab } = browser();
    const [first, second] = [tab(), tab()];
    first.start();
    second.start();
    time.now = 34_000;
    second.heard();
    time.now = 68_000;
    expect(second.leads()).toBe(false);
    time.now = 69_001;
    expect(second.leads()).toBe(true);
    second.heard();
    expect(second.leads()).toBe(false);
    first.stop();
    second.stop();
  });

  it('lets every tab lead where there are no locks', () => {
    const lead = new TabLead({ locks: undefined, now: () => 0, beat: () => undefined });
    lead.start();
    expect(lead.leads()).toBe(true);
  });
});
