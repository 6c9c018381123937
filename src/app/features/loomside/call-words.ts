import { clockTime } from '../../ui/clock-time';
import type { CallView } from './loom-view';

/** How a call stands, in words that never say "sent" of what is only saved. */
export function callWords(call: CallView | null, timeZone: string): string {
  if (!call) return '';
  const at = call.at === null ? '' : ` ${clockTime(call.at, timeZone)}`;
  switch (call.state) {
    case 'not-sent':
      return 'Not sent: fetch the tackler';
    case 'needs-look':
      return 'The book did not take the call: fetch the tackler';
    case 'sent':
      return `Sent, called${at}`;
    case 'taken':
      return `Tackler comes, said${at}`;
    case 'arrived':
      return `Tackler there since${at}`;
  }
}
