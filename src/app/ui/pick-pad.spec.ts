import { TestBed } from '@angular/core/testing';
import { MatIconTestingModule } from '@angular/material/icon/testing';
import { PickPad, type PickReading } from './pick-pad';
import type { ClockQuestion } from './pick-reading';

const CLOCK = { kind: 'continuous', unit: 1, digits: 6 } as const;
/** 480 minutes at 200 ppm: 96,000 picks are possible. */
const ABOUT: ClockQuestion = { id: 'loom-1 end', clock: CLOCK, ppm: 200, previous: 10_000, minutes: 480 };

async function openPad(about: ClockQuestion = ABOUT) {
  TestBed.configureTestingModule({ imports: [PickPad, MatIconTestingModule] });
  const fixture = TestBed.createComponent(PickPad);
  fixture.componentRef.setInput('about', about);
  const readings: PickReading[] = [];
  fixture.componentInstance.read.subscribe((reading) => readings.push(reading));
  await fixture.whenStable();
  const page = fixture.nativeElement as HTMLElement;
  const buttons = () => [...page.querySelectorAll<HTMLButtonElement>('button')];
  const paste = async (text: string) => {
    const field = page.querySelector<HTMLInputElement>('input')!;
    field.value = text;
    field.dispatchEvent(new Event('input'));
    await fixture.whenStable();
  };
  return {
    readings,
    page,
    text: () => page.textContent ?? '',
    /** What the pad says of the number that stands in it. */
    words: () => page.querySelector('#pick-pad-words')?.textContent?.trim(),
    field: () => page.querySelector<HTMLInputElement>('input')!,
    async press(...names: string[]) {
      for (const name of names) {
        const button = buttons().find(
          (b) => b.textContent?.trim() === name || b.getAttribute('aria-label') === name,
        );
        if (!button) throw new Error(`no key ${name}`);
        button.click();
        await fixture.whenStable();
      }
    },
    async about(next: ClockQuestion) {
      fixture.componentRef.setInput('about', next);
      await fixture.whenStable();
    },
    paste,
    /** One key after the other at the end of what the field shows. */
    async typeKeys(text: string) {
      if (text === '') await paste('');
      for (const key of text) await paste(page.querySelector<HTMLInputElement>('input')!.value + key);
    },
  };
}

describe('PickPad', () => {
  it('takes a believable reading by keys and says what it means', async () => {
    const pad = await openPad();
    await pad.press('9', '2', '0', '0', '0');
    expect(pad.text()).toContain('82,000 picks · 85.4%');
    await pad.press('Next');
    expect(pad.readings).toEqual([{ value: 92_000, kept: false }]);
  });

  it('reads a clock that rolled over', async () => {
    const pad = await openPad({ ...ABOUT, previous: 980_000 });
    await pad.press('6', '2', '0', '0', '0');
    expect(pad.text()).toContain('82,000 picks');
  });

  it('asks about more than the loom can weave, and marks it when it is kept', async () => {
    const pad = await openPad();
    await pad.press('4', '0', '0', '0', '0', '0', 'Next');
    expect(pad.readings).toEqual([]);
    expect(pad.text()).toContain('More than this loom can weave: 96,000 picks are possible');
    await pad.press('Keep it');
    expect(pad.readings).toEqual([{ value: 400_000, kept: true }]);
  });

  it('asks about a lower reading in words that can be answered', async () => {
    const pad = await openPad({ ...ABOUT, previous: 41_308 });
    await pad.press('4', '1', '3', '0', '7');
    expect(pad.words()).toBe('');
    await pad.press('Next');
    expect(pad.text()).toContain(
      'Lower than the last reading (41,308). Did the clock roll over, or was it set back? Read it again, or keep it.',
    );
    expect(pad.text()).not.toContain('%');
    expect(pad.readings).toEqual([]);
    await pad.press('Keep it');
    expect(pad.readings).toEqual([{ value: 41_307, kept: true }]);
  });

  it('says nothing of what an unfinished or impossible number would mean', async () => {
    const pad = await openPad();
    await pad.press('9', '2');
    expect(pad.words()).toBe('');
    await pad.press('0', '0', '0');
    expect(pad.words()).toBe('82,000 picks · 85.4%');
    await pad.press('0');
    expect(pad.words()).toBe('');
  });

  it('lets the clock be read again, and then asks nothing of a believable reading', async () => {
    const pad = await openPad();
    await pad.press('4', '0', '0', '0', '0', '0', 'Next', 'Read again');
    expect(pad.field().value).toBe('');
    await pad.press('4', '0', '0', '0', '0', 'Next');
    expect(pad.readings).toEqual([{ value: 40_000, kept: false }]);
  });

  it('believes a loom a twentieth above its speed and one step of the clock', async () => {
    const edge = await openPad({ ...ABOUT, previous: 0 });
    await edge.paste('100801');
    await edge.press('Next');
    expect(edge.readings).toEqual([{ value: 100_801, kept: false }]);
    await edge.paste('100802');
    await edge.press('Next');
    expect(edge.readings).toHaveLength(1);
    expect(edge.text()).toContain('More than this loom can weave');
  });

  it('refuses letters, negative and too long numbers with a sentence', async () => {
    const pad = await openPad();
    await pad.paste('12a');
    expect(pad.text()).toContain('“12a” is not a reading');
    await pad.paste('-500');
    expect(pad.text()).toContain('no reading below nought');
    await pad.paste('12');
    await pad.paste('1234567');
    expect(pad.text()).toContain('This clock has 6 digits');
    expect(pad.field().value).toBe('12');
    expect(pad.readings).toEqual([]);
  });

  it.each(['12.5', '4200.0', '-42000', '1.234', '1.234.567', '1,23', '4,200.0', '9e4'])(
    'makes no other number of %s, pasted or typed key by key',
    async (text) => {
      const pad = await openPad();
      for (const enter of [pad.paste, pad.typeKeys]) {
        await enter('');
        await enter(text);
        expect(pad.words()).toMatch(/is not a reading|no reading below nought/);
        expect(pad.field().value.replaceAll(',', '')).toBe(text.replaceAll(',', ''));
        expect(pad.page.querySelector<HTMLButtonElement>('[aria-label="Next"]')?.disabled).toBe(true);
        pad.field().dispatchEvent(new KeyboardEvent('keydown', { key: 'Enter' }));
        expect(pad.readings).toEqual([]);
      }
    },
  );

  it.each(['12,3456', '92 00', '1,234 567'])(
    'takes no pasted %s: its groups are not of three',
    async (text) => {
      const pad = await openPad();
      await pad.paste(text);
      expect(pad.words()).toContain(`“${text}” is not a reading`);
      expect(pad.field().value).toBe(text);
    },
  );

  it.each(['92,000', '92 000', '92\u202f000', '92’000', '092000', ' 92000 '])(
    'takes %s, pasted or typed key by key',
    async (text) => {
      const pad = await openPad();
      for (const enter of [pad.paste, pad.typeKeys]) {
        await enter('');
        await enter(text);
        expect(pad.field().value).toBe('92,000');
      }
    },
  );

  it('sets off the thousands anew when a digit is put in or taken out', async () => {
    const pad = await openPad();
    await pad.paste('92,000');
    await pad.paste('92,0001');
    expect(pad.field().value).toBe('920,001');
    await pad.paste('20,001');
    expect(pad.field().value).toBe('20,001');
    await pad.paste('2,001');
    await pad.paste('2001');
    expect(pad.field().value).toBe('2,001');
  });

  it('lets what was refused be mended by the keys', async () => {
    const pad = await openPad();
    await pad.paste('12.');
    await pad.press('5');
    expect(pad.field().value).toBe('12.5');
    await pad.press('Erase', 'Erase', '5');
    expect(pad.field().value).toBe('125');
    expect(pad.words()).not.toContain('not a reading');
  });

  it('keeps what was typed while time goes on, and starts empty for the next loom', async () => {
    const pad = await openPad();
    await pad.press('1', '2');
    await pad.about({ ...ABOUT, minutes: 481 });
    expect(pad.field().value).toBe('12');
    await pad.about({ ...ABOUT, id: 'loom-2 end' });
    expect(pad.field().value).toBe('');
  });

  it('asks nothing where there is nothing to hold it against', async () => {
    const pad = await openPad({ ...ABOUT, previous: null, minutes: null });
    await pad.press('5', 'Next');
    expect(pad.text()).toContain('none known');
    expect(pad.readings).toEqual([{ value: 5, kept: false }]);
  });
});
