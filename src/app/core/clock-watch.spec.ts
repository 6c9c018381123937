import { ClockWatch } from './clock-watch';

const T0 = Date.UTC(2026, 10, 30, 8);

function setUp() {
  const clocks = { wall: T0, mono: 1_000 };
  const watch = new ClockWatch({ now: () => clocks.wall, monotonic: () => clocks.mono });
  const pass = (ms: number) => {
    clocks.wall += ms;
    clocks.mono += ms;
  };
  return { clocks, watch, pass };
}

describe('ClockWatch', () => {
  it('measures the offset at the middle of an exchange', () => {
    const { clocks, watch, pass } = setUp();
    pass(200);
    expect(watch.exchanged(T0, clocks.wall, T0 + 60_100)).toEqual({ offset: 60_000, measuredAt: T0 + 200 });
    expect(watch.correctedNow()).toBe(T0 + 60_200);
  });

  it('sees no step in the ordinary passing of time', () => {
    const { watch, pass } = setUp();
    pass(8 * 3_600_000);
    expect(watch.steppedSince(T0)).toBe(false);
  });

  it('knows a clock that was set back at once', () => {
    const { clocks, watch, pass } = setUp();
    pass(60_000);
    clocks.wall -= 30_000;
    expect(watch.steppedSince(T0)).toBe(true);
    pass(60_000);
    expect(watch.steppedSince(clocks.wall - 10_000)).toBe(false);
  });

  it('takes a leap forward for sleep while the offset stays as it was', () => {
    const { clocks, watch } = setUp();
    watch.exchanged(clocks.wall, clocks.wall, clocks.wall + 5_000);
    clocks.wall += 3_600_000;
    watch.now();
    watch.exchanged(clocks.wall, clocks.wall, clocks.wall + 5_100);
    expect(watch.steppedSince(T0)).toBe(false);
  });

  it('takes a leap forward for a step once the offset has moved', () => {
    const { clocks, watch } = setUp();
    watch.exchanged(clocks.wall, clocks.wall, clocks.wall + 5_000);
    clocks.wall += 3_600_000;
    watch.now();
    watch.exchanged(clocks.wall, clocks.wall, clocks.wall - 3_595_000);
    expect(watch.steppedSince(T0)).toBe(true);
  });
});
