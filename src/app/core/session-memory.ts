import { Injectable } from '@angular/core';
import {
  deviceStateSchema,
  grantSchema,
  signedInPersonSchema,
  type DeviceState,
  type Grant,
  type Session,
  type SignedInPerson,
} from '@shared/contract/session';
import * as z from 'zod/mini';
import { newId } from './ids';

const KEY = 'shedbeat.session.1';
const BROWSER_KEY = 'shedbeat.browser.1';

const rememberedSchema = z.object({
  person: z.nullable(signedInPersonSchema),
  grant: z.nullable(grantSchema),
  device: z.nullable(deviceStateSchema),
  /** Somebody signed out without network: the server is told at the next chance. */
  signOutOwed: z.boolean(),
});

export interface Remembered {
  readonly person: SignedInPerson | null;
  readonly grant: Grant | null;
  readonly device: DeviceState | null;
  readonly signOutOwed: boolean;
}

const NOTHING: Remembered = { person: null, grant: null, device: null, signOutOwed: false };

/**
 * What a browser remembers of its last sign-in, so that the application starts without network: whose device this
 * is, and in an office who was signed in. No token and no PIN is ever here. On a tablet the person is not
 * remembered: a reload without network asks for the PIN.
 */
@Injectable({ providedIn: 'root' })
export class SessionMemory {
  /** This browser's own id, made once: entries made in an office browser carry it as their device. */
  browserId(): string {
    const known = this.read(BROWSER_KEY);
    if (known) return known;
    this.write(BROWSER_KEY, newId());
    // Read again: if two tabs start at once, the last writer's id holds for both.
    return this.read(BROWSER_KEY) ?? newId();
  }

  recall(): Remembered {
    try {
      const parsed = rememberedSchema.safeParse(JSON.parse(this.read(KEY) ?? 'null'));
      return parsed.success ? parsed.data : NOTHING;
    } catch {
      return NOTHING;
    }
  }

  remember(session: Session): void {
    const atDesk = session.device?.kind !== 'tablet';
    this.write(
      KEY,
      JSON.stringify({
        person: atDesk ? session.person : null,
        grant: atDesk ? session.grant : null,
        device: session.device,
        signOutOwed: false,
      } satisfies Remembered),
    );
  }

  /** Forgets the person, keeps the device. */
  forgetPerson(signOutOwed: boolean): void {
    this.write(KEY, JSON.stringify({ ...NOTHING, device: this.recall().device, signOutOwed }));
  }

  private read(key: string): string | null {
    try {
      return localStorage.getItem(key);
    } catch {
      return null;
    }
  }

  /** A browser that allows no storage still works while it is open. */
  private write(key: string, value: string): void {
    try {
      localStorage.setItem(key, value);
    } catch {
      // Nothing is lost but the comfort of starting without network.
    }
  }
}
