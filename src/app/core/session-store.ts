import { DestroyRef, Injectable, computed, inject, signal } from '@angular/core';
import { DEVICE_PERMISSIONS, type Permission } from '@shared/contract/roles';
import {
  sessionSchema,
  type DeviceState,
  type Grant,
  type Session,
  type SignedInPerson,
} from '@shared/contract/session';
import * as z from 'zod/mini';
import { AccessToken } from './access-token';
import { DONE, outcomeOf, type Answer, type Outcome } from './answer';
import { ApiClient } from './api-client';
import { API } from './api-paths';
import { Clock } from './clock';
import { underLock } from './locks';
import { SessionMemory } from './session-memory';

export type SessionState = 'unknown' | 'nobody' | 'signed-in' | 'unlocked-offline';

export interface FirstRun {
  readonly code: string;
  readonly millName: string;
  readonly timeZone: string;
  readonly units: 'metric' | 'imperial';
  readonly name: string;
  readonly email: string;
  readonly password: string;
}

/** How long the start waits for the server before it goes on with what is remembered. */
const START_LIMIT = 4_000;
const LOCK_LIMIT = 10_000;
const CHANNEL = 'shedbeat-session';

/** Who is asking. Signed out only by the server's word (a 4xx) or by the person, never by a missing network. */
@Injectable({ providedIn: 'root' })
export class SessionStore {
  private readonly api = inject(ApiClient);
  private readonly token = inject(AccessToken);
  private readonly memory = inject(SessionMemory);
  private readonly clock = inject(Clock);
  private readonly tabs = typeof BroadcastChannel === 'function' ? new BroadcastChannel(CHANNEL) : null;

  private readonly personNow = signal<SignedInPerson | null>(null);
  private readonly grantNow = signal<Grant | null>(null);
  private readonly deviceNow = signal<DeviceState | null>(null);
  private readonly stateNow = signal<SessionState>('unknown');
  private readonly firstManager = signal(false);
  private refreshing: Promise<Outcome> | null = null;
  private started: Promise<void> | null = null;
  /** Counts sign-ins and leavings here: an answer to a question that was asked before is no longer the truth. */
  private turns = 0;

  readonly person = this.personNow.asReadonly();
  readonly grant = this.grantNow.asReadonly();
  readonly device = this.deviceNow.asReadonly();
  readonly state = this.stateNow.asReadonly();
  readonly needsFirstManager = this.firstManager.asReadonly();
  /** Somebody is at this device, checked online or by the offline PIN. */
  readonly somebody = computed(() => this.personNow() !== null);
  readonly isTablet = computed(() => this.deviceNow()?.kind === 'tablet');
  readonly permissions = computed<ReadonlySet<Permission>>(() => {
    const person = this.personNow();
    if (!person) return new Set<Permission>(['public']);
    // Unlocked without network: log and pull, nothing else, until the PIN is checked online. The tackler's calls are
    // of what the tablet has pulled anyway, without names, and are what he is there for.
    if (this.stateNow() === 'unlocked-offline') {
      const ofTablet = new Set<Permission>(DEVICE_PERMISSIONS.active);
      return person.permissions.includes('calls.read') ? ofTablet.add('calls.read') : ofTablet;
    }
    return new Set(person.permissions);
  });

  constructor() {
    this.token.renew = async () => (await this.refresh()).ok && this.token.value !== null;
    this.tabs?.addEventListener('message', () => void this.refresh());
    inject(DestroyRef).onDestroy(() => this.tabs?.close());
  }

  may(permission: Permission): boolean {
    return this.permissions().has(permission);
  }

  /** Finds out who is here. Resolves at the latest after four seconds, with what is remembered. */
  start(): Promise<void> {
    return (this.started ??= this.begin());
  }

  signInFloor(worksNumber: string, pin: string): Promise<Outcome> {
    return this.enter(API.signInFloor, { worksNumber, pin });
  }

  signInOffice(email: string, password: string): Promise<Outcome> {
    return this.enter(API.signInOffice, { email, password, browserId: this.memory.browserId() });
  }

  /** Makes the mill and its first manager by the code that the server printed. */
  firstRun(first: FirstRun): Promise<Outcome> {
    return this.enter(API.firstRun, { ...first, browserId: this.memory.browserId() });
  }

  /** Chooses a password by a letter's one-time link, and is signed in by it. */
  redeemLink(token: string, password: string): Promise<Outcome> {
    return this.enter(API.redeemLink, { token, password, browserId: this.memory.browserId() });
  }

  /** Makes this browser a tablet by a code from another; nobody is signed in on it then. */
  registerByCode(code: string): Promise<Outcome> {
    return this.enter(API.registerByCode, { code });
  }

  /** Makes this browser a tablet of a shed. Needs `devices.register`; who did so stays signed in if the server says so. */
  async registerTablet(name: string, shedId: string): Promise<Outcome> {
    const answer = await this.api.post(API.devices, sessionSchema, { name, shedId });
    if (answer.kind !== 'ok') return outcomeOf(answer);
    this.turns++;
    this.take(answer.body, false);
    this.tellTabs();
    return DONE;
  }

  /** Leaves at once on this device; a server that cannot be reached is told at the next chance. Queues stay. */
  async signOut(): Promise<void> {
    this.leave();
    this.memory.forgetPerson(true);
    await this.payOwedSignOut();
    this.token.value = null;
    this.tellTabs();
    await this.refresh();
  }

  /** Asks the server who is here, one tab at a time. */
  refresh(): Promise<Outcome> {
    this.refreshing ??= underLock('shedbeat-refresh', LOCK_LIMIT, () => this.askWho()).finally(() => {
      this.refreshing = null;
    });
    return this.refreshing;
  }

  /** Called by the offline layer when a PIN was right without network. */
  unlockOffline(person: SignedInPerson, grant: Grant): void {
    this.personNow.set(person);
    this.grantNow.set(grant);
    this.stateNow.set('unlocked-offline');
  }

  /** Locks the screen again, e.g. when the server says that the PIN was wrong after all. */
  leave(): void {
    this.turns++;
    this.personNow.set(null);
    this.grantNow.set(null);
    this.stateNow.set('nobody');
  }

  private async begin(): Promise<void> {
    const limit = new Promise<null>((resolve) => setTimeout(() => resolve(null), START_LIMIT));
    await Promise.race([this.refresh(), limit]);
    if (this.stateNow() === 'unknown') this.goOnWithMemory();
  }

  private goOnWithMemory(): void {
    const known = this.memory.recall();
    this.deviceNow.set(known.device);
    this.personNow.set(known.person);
    this.grantNow.set(known.grant);
    this.stateNow.set(known.person ? 'signed-in' : 'nobody');
  }

  private async askWho(): Promise<Outcome> {
    await this.payOwedSignOut();
    const turn = this.turns;
    const answer = await this.exchange(API.refresh, { browserId: this.memory.browserId() });
    if (turn !== this.turns) return outcomeOf(answer);
    if (answer.kind === 'ok') this.take(answer.body, this.stateNow() === 'unlocked-offline');
    else if (answer.kind === 'problem' && answer.status < 500 && answer.status !== 429) {
      this.token.value = null;
      this.memory.forgetPerson(false);
      this.leave();
    }
    return outcomeOf(answer);
  }

  private async enter(path: string, body: unknown): Promise<Outcome> {
    const answer = await this.exchange(path, body);
    if (answer.kind !== 'ok') return outcomeOf(answer);
    this.turns++;
    this.take(answer.body, false);
    this.tellTabs();
    return DONE;
  }

  private async exchange(path: string, body: unknown): Promise<Answer<Session>> {
    const sentAt = this.clock.now();
    const answer = await this.api.bare(path, sessionSchema, body);
    if (answer.kind === 'ok') this.clock.exchanged(sentAt, this.clock.now(), answer.body.serverNow);
    return answer;
  }

  /**
   * `keepUnlocked`: somebody unlocked the tablet and the PIN is still to be checked. The cookies' word on who is here
   * is about whoever was signed in before.
   */
  private take(session: Session, keepUnlocked: boolean): void {
    this.token.value = session.accessToken;
    this.firstManager.set(session.needsFirstManager);
    this.deviceNow.set(session.device);
    this.memory.remember(session);
    if (keepUnlocked && session.device && !session.device.revoked) return;
    this.personNow.set(session.person);
    this.grantNow.set(session.grant);
    this.stateNow.set(session.person ? 'signed-in' : 'nobody');
  }

  private async payOwedSignOut(): Promise<void> {
    if (!this.memory.recall().signOutOwed) return;
    const answer = await this.api.bare(API.signOut, z.unknown(), {});
    const heard = answer.kind === 'ok' || (answer.kind === 'problem' && answer.status < 500);
    if (heard) this.memory.forgetPerson(false);
  }

  private tellTabs(): void {
    this.tabs?.postMessage('changed');
  }
}
