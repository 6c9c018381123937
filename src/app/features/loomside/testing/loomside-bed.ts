import { signal, type Type } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { MATERIAL_ANIMATIONS } from '@angular/material/core';
import { MatIconTestingModule } from '@angular/material/icon/testing';
import { provideRouter, withComponentInputBinding } from '@angular/router';
import { WEAVER_ID } from '@shared/testing/builders';
import { Clock } from '../../../core/clock';
import { SessionStore } from '../../../core/session-store';
import { OfflineBook } from '../../../offline/offline-book';
import { HalfTyped } from '../../../offline/half-typed';
import { PersonalWays } from '../../../offline/personal-ways';
import { UsualStore } from '../../../offline/usual-store';
import { LoomsidePage } from '../loomside-page';
import { FakeBook, FakeClock } from './fake-book';
import { FakeHalfTyped, FakeUsual, FakeWays } from './fake-personal';

/** A test bed whose screens find a fake book, a clock that stands still, and a weaver at the device. */
export function loomsideBed() {
  const clock = new FakeClock();
  const book = new FakeBook(clock);
  const typed = new FakeHalfTyped();
  const ways = new FakeWays();
  const usual = new FakeUsual();
  TestBed.configureTestingModule({
    // A screen with deferred parts has its metadata only once it was compiled as one of the bed's.
    imports: [MatIconTestingModule, LoomsidePage],
    providers: [
      provideRouter([{ path: '**', children: [] }], withComponentInputBinding()),
      { provide: MATERIAL_ANIMATIONS, useValue: { animationsDisabled: true } },
      { provide: Clock, useValue: clock },
      { provide: OfflineBook, useValue: book },
      { provide: HalfTyped, useValue: typed },
      { provide: PersonalWays, useValue: ways },
      { provide: UsualStore, useValue: usual },
      {
        provide: SessionStore,
        useValue: { person: signal({ id: WEAVER_ID, roles: ['weaver'] }), may: () => false },
      },
    ],
  });
  return { book, clock, typed, ways, usual };
}

/** A screen in the test bed, found and pressed by what a person reads. */
export async function openScreen<T>(screen: Type<T>, inputs: Readonly<Record<string, unknown>> = {}) {
  await TestBed.compileComponents();
  const fixture = TestBed.createComponent(screen);
  for (const [name, value] of Object.entries(inputs)) fixture.componentRef.setInput(name, value);
  await fixture.whenStable();
  const page = fixture.nativeElement as HTMLElement;
  const settle = () => fixture.whenStable();
  const named = (within: ParentNode, name: string | RegExp) => {
    const fits = (text: string) => (typeof name === 'string' ? text === name : name.test(text));
    const found = [...within.querySelectorAll<HTMLElement>('button, a')].find(
      (button) =>
        fits((button.textContent ?? '').trim().replace(/\s+/g, ' ')) ||
        fits(button.getAttribute('aria-label') ?? ''),
    );
    if (!found) throw new Error(`nothing to press is called ${name}`);
    return found;
  };
  return {
    fixture,
    page,
    settle,
    loom(number: number): HTMLElement {
      const card = page.querySelector<HTMLElement>(`[data-loom="${number}"]`);
      if (!card) throw new Error(`no card of loom ${number}`);
      return card;
    },
    button: named,
    async press(within: ParentNode, ...names: (string | RegExp)[]) {
      for (const name of names) {
        named(within, name).click();
        await settle();
      }
    },
    text: () => (page.textContent ?? '').replace(/\s+/g, ' '),
  };
}
