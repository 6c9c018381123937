import { Injectable, computed, inject, signal } from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { SwPush } from '@angular/service-worker';
import { pushDoneSchema, pushKeySchema, pushSubscriptionSchema } from '@shared/contract/calls';
import { outcomeOf } from '../../core/answer';
import { ApiClient } from '../../core/api-client';

const SUBSCRIPTIONS = '/api/push/subscriptions';

export type PushState = 'unsupported' | 'off' | 'on' | 'denied';

/** Word of calls while the page is closed: through the push service of the browser's maker, where there is internet. */
@Injectable({ providedIn: 'root' })
export class PushWord {
  private readonly push = inject(SwPush);
  private readonly api = inject(ApiClient);
  private readonly subscription = toSignal(this.push.subscription, { initialValue: null });
  private readonly told = signal(false);
  private readonly permission = signal(permissionNow());

  readonly busy = signal(false);
  /** Why it could not be switched; empty: it could. */
  readonly trouble = signal('');
  readonly state = computed<PushState>(() => {
    if (!this.push.isEnabled || this.permission() === 'unsupported') return 'unsupported';
    if (this.permission() === 'denied') return 'denied';
    return this.subscription() && this.told() ? 'on' : 'off';
  });

  /** A subscription ends with the sign-in that made it: whoever signs in again on their browser has it anew. */
  async renew(): Promise<void> {
    const subscription = this.subscription();
    if (subscription && this.permission() === 'granted' && !this.told()) await this.tell(subscription);
  }

  async switchOn(): Promise<void> {
    await this.doing(async () => {
      const key = await this.api.get('/api/push/key', pushKeySchema);
      if (key.kind !== 'ok') return this.failed(key);
      try {
        const subscription = await this.push.requestSubscription({ serverPublicKey: key.body.publicKey });
        await this.tell(subscription);
      } catch {
        this.permission.set(permissionNow());
        this.trouble.set(
          this.permission() === 'denied'
            ? 'This browser was told to show no notices of this page. Allow them in its settings, then switch it on again.'
            : 'The browser’s push service cannot be reached. Calls still show, sound and shake here while this page is open.',
        );
      }
    });
  }

  async switchOff(): Promise<void> {
    await this.doing(async () => {
      const endpoint = this.subscription()?.endpoint;
      if (endpoint !== undefined) {
        const answer = await this.api.post(`${SUBSCRIPTIONS}/end`, pushDoneSchema, { endpoint });
        if (answer.kind !== 'ok') return this.failed(answer);
      }
      await this.push.unsubscribe().catch(() => undefined);
      this.told.set(false);
    });
  }

  private async tell(subscription: PushSubscription): Promise<void> {
    this.permission.set(permissionNow());
    const said = pushSubscriptionSchema.safeParse(subscription.toJSON());
    if (!said.success) {
      this.trouble.set('This browser’s way of push is not one that the server knows. Calls still show here.');
      return;
    }
    const answer = await this.api.post(SUBSCRIPTIONS, pushDoneSchema, said.data);
    if (answer.kind === 'ok') this.told.set(true);
    else this.failed(answer);
  }

  private async doing(work: () => Promise<void>): Promise<void> {
    if (this.busy()) return;
    this.busy.set(true);
    this.trouble.set('');
    await work().finally(() => this.busy.set(false));
  }

  private failed(answer: Parameters<typeof outcomeOf>[0]): void {
    const outcome = outcomeOf(answer);
    if (!outcome.ok) this.trouble.set(outcome.sentence);
  }
}

function permissionNow(): NotificationPermission | 'unsupported' {
  return typeof Notification === 'undefined' ? 'unsupported' : Notification.permission;
}
