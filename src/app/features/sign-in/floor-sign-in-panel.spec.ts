import { signal } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { MatIconTestingModule } from '@angular/material/icon/testing';
import { DONE, type Outcome } from '../../core/answer';
import { FloorSignIn } from '../../offline/floor-sign-in';
import { FloorSignInPanel } from './floor-sign-in-panel';

const NUALA = { id: 'weaver-1', shortName: 'Nuala D.', worksNumber: '7' };

async function openPanel(
  outcome: Outcome,
  { known = [] as unknown[], refused = null as string | null } = {},
) {
  const tried: [string, string][] = [];
  const floor = {
    known: () => Promise.resolve(known),
    refused: signal(refused),
    unlocksOffline: true,
    signIn: (number: string, pin: string) => {
      tried.push([number, pin]);
      return Promise.resolve(outcome);
    },
  };
  TestBed.configureTestingModule({
    imports: [MatIconTestingModule],
    providers: [{ provide: FloorSignIn, useValue: floor }],
  });
  const fixture = TestBed.createComponent(FloorSignInPanel);
  let signedIn = 0;
  fixture.componentInstance.signedIn.subscribe(() => signedIn++);
  await fixture.whenStable();
  const page = fixture.nativeElement as HTMLElement;
  return {
    tried,
    signedIn: () => signedIn,
    page,
    async type(...keys: string[]) {
      for (const key of keys) {
        const at = document.activeElement ?? document.body;
        const event = new KeyboardEvent('keydown', { key, bubbles: true, cancelable: true });
        // A browser presses a focused button at Enter.
        if (at.dispatchEvent(event) && key === 'Enter' && at instanceof HTMLButtonElement) at.click();
        await fixture.whenStable();
      }
    },
    text: () => page.textContent?.replace(/\s+/g, ' ') ?? '',
    async press(...names: string[]) {
      for (const name of names) {
        const button = [...page.querySelectorAll('button')].find(
          (one) => one.textContent?.trim().startsWith(name) || one.getAttribute('aria-label') === name,
        );
        if (!button) throw new Error(`no key ${name}`);
        button.click();
        await fixture.whenStable();
      }
    },
  };
}

describe('FloorSignInPanel', () => {
  it('takes works number and PIN by keys alone; the sixth digit is enough', async () => {
    const panel = await openPanel(DONE);
    await panel.press('1', '2', 'On to the PIN', '2', '4', '6', '8', '1');
    expect(panel.tried).toEqual([]);
    await panel.press('0');
    expect(panel.tried).toEqual([['12', '246810']]);
    expect(panel.signedIn()).toBe(1);
  });

  it('keeps the label beside the digits that are typed', async () => {
    const panel = await openPanel(DONE);
    expect(panel.text()).toContain('Works number');
    await panel.press('1', '2');
    expect(panel.text()).toMatch(/Works number ?12/);
  });

  it('hears typed digits wherever the focus fell, on both steps', async () => {
    const panel = await openPanel(DONE);
    await panel.type('1', '3', 'Backspace', '2');
    await panel.press('On to the PIN');
    expect(document.activeElement).toBe(panel.page);
    await panel.type('2', '4', '6', '8', '1', '0');
    expect(panel.tried).toEqual([['12', '246810']]);
  });

  it('goes on at Enter, and does not repeat a digit that was clicked', async () => {
    const panel = await openPanel(DONE);
    const key = [...panel.page.querySelectorAll('button')].find((one) => one.textContent?.trim() === '7')!;
    key.focus();
    key.dispatchEvent(new MouseEvent('click', { bubbles: true, detail: 1 }));
    await panel.type('Enter');
    expect(panel.text()).toContain('PIN of number 7');
  });

  it('leaves what is typed in a field to the field', async () => {
    const panel = await openPanel(DONE);
    const field = document.body.appendChild(document.createElement('input'));
    field.focus();
    await panel.type('5');
    field.remove();
    // No number was taken: there is nothing to go on with.
    expect(panel.page.querySelector<HTMLButtonElement>('[aria-label="On to the PIN"]')?.disabled).toBe(true);
  });

  it('offers who has signed in here before', async () => {
    const panel = await openPanel(DONE, { known: [NUALA] });
    await panel.press('Nuala D.', '2', '4', '6', '8', '1', '0');
    expect(panel.tried).toEqual([['7', '246810']]);
  });

  it('says why it could not be unlocked without network, and empties the PIN', async () => {
    const sentence =
      'The book cannot be reached, and this number has not signed in on this tablet before. Use the tablet that you used last, or fetch the foreman.';
    const panel = await openPanel({ ok: false, code: 'unlock-unknown', sentence });
    await panel.press('9', 'On to the PIN', '2', '4', '6', '8', '1', '0');
    expect(panel.text()).toContain(sentence);
    expect(panel.signedIn()).toBe(0);
    await panel.press('2', '4', '6', '8', '1', '0');
    expect(panel.tried).toHaveLength(2);
  });

  it('says that the server locked the screen again after an unlock without network', async () => {
    const panel = await openPanel(DONE, { refused: 'Number and PIN do not go together.' });
    expect(panel.text()).toContain('Number and PIN do not go together.');
  });

  it('never shows the digits of a PIN', async () => {
    const panel = await openPanel(DONE);
    await panel.press('7', 'On to the PIN', '9', '9', '9');
    expect(panel.text().replace(/PIN of number 7/, '')).not.toContain('999');
  });
});
