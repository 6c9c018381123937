import { NotSaved } from '../../offline/not-saved';
import { LoomsidePage } from './loomside-page';
import { loomsideBed, openScreen } from './testing/loomside-bed';

const WARP = /^Warp break, /;

describe('LoomsidePage', () => {
  it('logs a tap as one counted stop, and shows it as saved only once it is', async () => {
    const { book } = loomsideBed();
    let open = () => {};
    book.gate = new Promise<void>((resolve) => (open = resolve));
    const screen = await openScreen(LoomsidePage);
    const warp = screen.button(screen.loom(2), WARP);
    warp.click();
    await vi.waitFor(() => expect(warp.getAttribute('aria-busy')).toBe('true'));
    expect(warp.classList).not.toContain('just');
    expect(screen.text()).not.toContain('counted');
    open();
    await vi.waitFor(() => expect(warp.classList).toContain('just'));
    expect(book.logged).toMatchObject([{ kind: 'stop', loomId: 'loom-2', cause: 'warp-break', count: 1 }]);
    expect(screen.text()).toContain('Warp break on loom 2, counted 11:00');
    expect(screen.loom(2).textContent).toContain('1 not sent');
    expect(screen.loom(1).textContent).not.toContain('not sent');
  });

  it('says what to do where a tap could not be saved, and shows it nowhere as saved', async () => {
    const { book } = loomsideBed();
    book.failure = new NotSaved('storage-full');
    const screen = await openScreen(LoomsidePage);
    await screen.press(screen.loom(1), WARP);
    const alert = screen.loom(1).querySelector('[role=alert]');
    expect(alert?.textContent).toContain('Not saved: this device’s storage is full');
    expect(screen.text()).not.toContain('counted');
    expect(book.logged).toEqual([]);
    book.failure = null;
    await screen.press(screen.loom(1), WARP);
    expect(screen.loom(1).querySelector('[role=alert]')).toBeNull();
    expect(book.logged).toHaveLength(1);
  });

  it('takes a finger that bounces as one tap, and a second tap as a second stop', async () => {
    const { book } = loomsideBed();
    const screen = await openScreen(LoomsidePage);
    const tapAt = async (loom: number, name: RegExp, at: number) => {
      const click = new MouseEvent('click', { bubbles: true });
      Object.defineProperty(click, 'timeStamp', { value: at });
      screen.button(screen.loom(loom), name).dispatchEvent(click);
      await screen.settle();
    };
    await tapAt(1, WARP, 1000);
    await tapAt(1, WARP, 1002);
    await tapAt(1, WARP, 1399);
    expect(book.logged).toMatchObject([{ loomId: 'loom-1', cause: 'warp-break' }]);
    await tapAt(2, WARP, 1399);
    await tapAt(1, /^Weft break, /, 1399);
    await tapAt(1, /^Weft break, /, 1799);
    expect(book.logged.slice(1)).toMatchObject([
      { loomId: 'loom-2', cause: 'warp-break' },
      { loomId: 'loom-1', cause: 'weft-break' },
      { loomId: 'loom-1', cause: 'weft-break' },
    ]);
  });

  it('takes a tap back by a void', async () => {
    const { book } = loomsideBed();
    const screen = await openScreen(LoomsidePage);
    await screen.press(screen.loom(1), /^Weft break, 0/);
    expect(screen.button(screen.loom(1), /^Weft break, 1/)).toBeTruthy();
    await screen.press(screen.page, 'Undo');
    expect(book.logged[1]).toMatchObject({ kind: 'void', targetId: book.logged[0]?.id });
    expect(screen.button(screen.loom(1), /^Weft break, 0/)).toBeTruthy();
    expect(screen.text()).not.toContain('Undo');
  });

  it('turns a tap into a loom that still stands, and back', async () => {
    const { book, clock } = loomsideBed();
    const screen = await openScreen(LoomsidePage);
    await screen.press(screen.loom(1), WARP);
    await screen.press(screen.page, 'Still standing');
    expect(book.logged.slice(1)).toMatchObject([
      { kind: 'void', targetId: book.logged[0]?.id },
      { kind: 'standing', loomId: 'loom-1', cause: 'warp-break', at: book.logged[0]?.at },
    ]);
    clock.at.update((at) => at + 4 * 60_000);
    await screen.settle();
    expect(screen.loom(1).classList).toContain('stands');
    expect(screen.loom(1).textContent).toContain('4 min');
    await screen.press(screen.page, 'Undo');
    expect(screen.loom(1).classList).not.toContain('stands');
    expect(screen.button(screen.loom(1), /^Warp break, 1/)).toBeTruthy();
  });

  it('opens a standing stop from the sheet and ends it by Running', async () => {
    const { book, clock } = loomsideBed();
    const screen = await openScreen(LoomsidePage);
    await screen.press(screen.loom(1), 'Other stop');
    const sheet = document.querySelector('app-stop-sheet')!;
    expect(sheet.textContent).toContain('Stop and isolate the loom');
    sheet.querySelectorAll<HTMLInputElement>('input[name=when]')[1]?.click();
    await screen.press(sheet, /^Cleaning and oiling$/);
    await vi.waitFor(() => expect(book.logged).toHaveLength(1));
    await screen.settle();
    expect(book.logged[0]).toMatchObject({
      kind: 'standing',
      cause: 'cleaning',
      at: clock.now() - 5 * 60_000,
    });
    expect(screen.loom(1).textContent).toContain('Cleaning and oiling');
    await screen.press(screen.loom(1), 'Running');
    expect(book.logged[1]).toMatchObject({ kind: 'resume', loomId: 'loom-1', targetId: book.logged[0]?.id });
    expect(screen.loom(1).classList).not.toContain('stands');
  });

  it('logs a break that stands since some minutes ago from the sheet', async () => {
    const { book, clock } = loomsideBed();
    const screen = await openScreen(LoomsidePage);
    await screen.press(screen.loom(1), 'Other stop');
    const sheet = document.querySelector('app-stop-sheet')!;
    for (const name of ['Warp break', 'Pern change']) expect(screen.button(sheet, name)).toBeTruthy();
    sheet.querySelectorAll<HTMLInputElement>('input[name=when]')[2]?.click();
    await screen.press(sheet, 'Weft break');
    await vi.waitFor(() => expect(book.logged).toHaveLength(1));
    expect(book.logged[0]).toMatchObject({
      kind: 'standing',
      loomId: 'loom-1',
      cause: 'weft-break',
      at: clock.now() - 15 * 60_000,
    });
  });

  it('stops all looms of the set by one entry, and runs them one by one', async () => {
    const { book } = loomsideBed();
    const screen = await openScreen(LoomsidePage);
    await screen.press(screen.loom(1), 'Other stop');
    const sheet = document.querySelector('app-stop-sheet')!;
    await screen.press(sheet, 'Power', 'My looms');
    await vi.waitFor(() => expect(book.logged).toHaveLength(1));
    await screen.settle();
    expect(book.logged[0]).toMatchObject({
      kind: 'shed-stop',
      cause: 'power',
      scope: { of: 'looms', loomIds: ['loom-1', 'loom-2'] },
    });
    expect([1, 2].map((n) => screen.loom(n).classList.contains('stands'))).toEqual([true, true]);
    await screen.press(screen.loom(2), 'Running');
    expect([1, 2].map((n) => screen.loom(n).classList.contains('stands'))).toEqual([true, false]);
  });

  it('changes the cause of what stands', async () => {
    const { book } = loomsideBed();
    await book.log({ kind: 'standing', loomId: 'loom-1', cause: 'warp-break' });
    const screen = await openScreen(LoomsidePage);
    await screen.press(screen.loom(1), 'Cause');
    await screen.press(document.querySelector('app-stop-sheet')!, 'Smash');
    await vi.waitFor(() => expect(book.logged).toHaveLength(2));
    await screen.settle();
    expect(book.logged[1]).toMatchObject({ kind: 'amend', change: { cause: 'smash' } });
    expect(screen.loom(1).textContent).toContain('Smash');
  });

  it('never says that a call was sent while it only lies here', async () => {
    const { book } = loomsideBed();
    await book.log({ kind: 'standing', loomId: 'loom-1', cause: 'picking' });
    const screen = await openScreen(LoomsidePage);
    await screen.press(screen.loom(1), 'Call');
    expect(book.logged[1]).toMatchObject({ kind: 'call', targetId: book.logged[0]?.id });
    expect(screen.loom(1).textContent).toContain('Not sent: fetch the tackler');
    const notice = () => screen.page.querySelector('app-logged-bar')?.textContent?.replace(/\s+/g, ' ');
    expect(notice()).toContain('Loom 1: call saved 11:00 Not sent: fetch the tackler');
    book.states.set(new Map([[book.logged[1]!.id, 'stored']]));
    await screen.settle();
    expect(screen.loom(1).textContent).toContain('Sent, called 11:00');
    expect(screen.loom(1).textContent).not.toContain('Not sent');
    expect(notice()).toContain('Loom 1: call saved 11:00 Sent, called 11:00');
  });

  it('says of a second call that one is open and since when, and logs none', async () => {
    const { book, clock } = loomsideBed();
    await book.log({ kind: 'standing', loomId: 'loom-1', cause: 'picking' });
    const screen = await openScreen(LoomsidePage);
    const notice = () => screen.page.querySelector('app-logged-bar')?.textContent?.replace(/\s+/g, ' ');
    let open = () => {};
    book.gate = new Promise<void>((resolve) => (open = resolve));
    // The second lands while the first is being saved, the third long after.
    screen.button(screen.loom(1), 'Call').click();
    screen.button(screen.loom(1), 'Call').click();
    open();
    await vi.waitFor(() => expect(book.logged).toHaveLength(2));
    await screen.settle();
    clock.at.update((at) => at + 8 * 60_000);
    await screen.settle();
    await screen.press(screen.loom(1), 'Call');
    expect(book.logged).toHaveLength(2);
    expect(notice()).toContain('Loom 1: a call is open since 11:00 Not sent: fetch the tackler');
    await screen.press(screen.page, 'Undo');
    expect(book.logged[2]).toMatchObject({ kind: 'void', targetId: book.logged[1]?.id });
    await screen.press(screen.loom(1), 'Call');
    expect(book.logged[3]).toMatchObject({ kind: 'call', loomId: 'loom-1' });
  });

  it('says that efficiency so far is at most, and names the looms still to read', async () => {
    loomsideBed();
    const screen = await openScreen(LoomsidePage);
    expect(screen.loom(1).textContent).toContain('at most');
    expect(screen.text()).toContain('still to read: 1, 2');
  });

  it('has a next step where nobody took the set over, and where no shift runs', async () => {
    const { book } = loomsideBed();
    book.set.set([]);
    const screen = await openScreen(LoomsidePage);
    expect(screen.text()).toContain('You mind no looms in this shift yet');
    book.shifts.set([]);
    await screen.settle();
    expect(screen.text()).toContain('No shift is running');
  });
});
