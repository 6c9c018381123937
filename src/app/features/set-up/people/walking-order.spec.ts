import { TestBed } from '@angular/core/testing';
import { MatIconTestingModule } from '@angular/material/icon/testing';
import type { Loom } from '@shared/contract/reference';
import { moved } from './moved';
import { WalkingOrder } from './walking-order';

const loom = (number: number): Loom => ({
  id: `n${number}`,
  shedId: 'north',
  number,
  row: 1,
  position: number,
  alley: 'A',
  from: 0,
  until: null,
});

async function open(order: readonly string[]) {
  TestBed.configureTestingModule({ imports: [MatIconTestingModule] });
  const fixture = TestBed.createComponent(WalkingOrder);
  fixture.componentRef.setInput('order', order);
  fixture.componentRef.setInput('looms', [1, 2, 3, 4].map(loom));
  await fixture.whenStable();
  const page = fixture.nativeElement as HTMLElement;
  document.body.append(page);
  return {
    order: () => fixture.componentInstance.order(),
    said: () => page.querySelector('[role="status"]')?.textContent?.trim(),
    async press(name: string) {
      const button = page.querySelector<HTMLButtonElement>(`button[aria-label="${name}"]`);
      if (!button || button.disabled) throw new Error(`no button ${name}`);
      button.click();
      await fixture.whenStable();
      await new Promise((resolve) => setTimeout(resolve));
    },
    async choose(id: string) {
      const list = page.querySelector('select');
      if (!list) throw new Error('no list');
      list.value = id;
      list.dispatchEvent(new Event('change'));
      await fixture.whenStable();
    },
  };
}

it('orders by buttons alone; the focus goes with the loom, and it is said where it is now', async () => {
  const editor = await open(['n3', 'n1', 'n2']);
  await editor.press('Loom 2, earlier');
  expect(editor.order()).toEqual(['n3', 'n2', 'n1']);
  expect(editor.said()).toBe('Loom 2 is now 2 of 3.');
  expect(document.activeElement?.getAttribute('aria-label')).toBe('Loom 2, earlier');
  await editor.press('Loom 2, earlier');
  // It is first: the button under the focus would be dead.
  expect(document.activeElement?.getAttribute('aria-label')).toBe('Loom 2, later');
  await editor.press('Loom 3, later');
  expect(editor.order()).toEqual(['n2', 'n1', 'n3']);
});

it('takes a loom in at the end, and out', async () => {
  const editor = await open(['n3', 'n1']);
  await editor.choose('n4');
  await editor.press('Loom 3, out of the set');
  expect(editor.order()).toEqual(['n1', 'n4']);
});

it('moves forwards and backwards, and leaves the list it was given alone', () => {
  const list = ['a', 'b', 'c', 'd'];
  expect(moved(list, 0, 2)).toEqual(['b', 'c', 'a', 'd']);
  expect(moved(list, 3, 0)).toEqual(['d', 'a', 'b', 'c']);
  expect(moved(list, 1, 1)).toEqual(list);
  expect(list).toEqual(['a', 'b', 'c', 'd']);
});
