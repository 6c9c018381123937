/** How often the leading tab says that it lives, and after how long a silence another one talks to the server too. */
const BEAT = 10_000;
const SILENCE = 35_000;
const LOCK = 'shedbeat-lead';

export interface TabLeadPorts {
  /** Undefined where there is no secure context: then every tab leads. */
  readonly locks: LockManager | undefined;
  readonly now: () => number;
  /** Tells the other tabs that this one lives. */
  readonly beat: () => void;
}

/**
 * One tab of a browser leads: it talks to the server, the others hear of it. The Web Lock says which. A leader that
 * is silent too long (frozen, hanging) is not waited for: then others talk to the server too, which costs a request
 * and nothing else, since every exchange may be repeated and may overlap with another tab's.
 */
export class TabLead {
  private holds = false;
  private heardAt: number;
  private ending: AbortController | null = null;
  private readonly changed = new Set<() => void>();

  constructor(private readonly ports: TabLeadPorts) {
    this.heardAt = ports.now();
  }

  start(): void {
    if (this.ending) return;
    const ending = (this.ending = new AbortController());
    this.heardAt = this.ports.now();
    if (!this.ports.locks) return;
    this.ports.locks
      .request(LOCK, { signal: ending.signal }, () => this.hold(ending.signal))
      .catch(() => undefined);
  }

  stop(): void {
    this.ending?.abort();
    this.ending = null;
    this.holds = false;
  }

  leads(): boolean {
    if (!this.ports.locks || this.holds) return true;
    return this.ports.now() - this.heardAt > SILENCE;
  }

  /** Another tab that leads was heard. */
  heard(): void {
    this.heardAt = this.ports.now();
  }

  /** Calls back when this tab begins to lead. */
  onLead(callback: () => void): void {
    this.changed.add(callback);
  }

  private hold(signal: AbortSignal): Promise<void> {
    this.holds = true;
    this.ports.beat();
    const timer = setInterval(() => this.ports.beat(), BEAT);
    for (const callback of this.changed) callback();
    return new Promise((resolve) => {
      signal.addEventListener('abort', () => {
        clearInterval(timer);
        this.holds = false;
        resolve();
      });
    });
  }
}
