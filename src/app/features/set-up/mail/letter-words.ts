import type { Letter } from '@shared/contract/set-up';

/** What became of a letter, in a sentence: what happened, what to do. */
export function letterSentence({ to, state, trouble }: Letter): string {
  switch (state) {
    case 'sent':
      return `The letter went out to ${to}.`;
    case 'kept':
      return `No mail server is set up, so the letter to ${to} did not go out. Hand over its link yourself.`;
    case 'waiting':
      return trouble
        ? `The letter to ${to} waits, and is tried again by itself: ${trouble}`
        : `The letter to ${to} is on its way.`;
    case 'failed':
      return `The letter to ${to} did not go out. ${trouble ?? ''}`.trim();
  }
}

export const LETTER_STATES: Readonly<Record<Letter['state'], string>> = {
  sent: 'sent',
  kept: 'kept here',
  waiting: 'waiting',
  failed: 'failed',
};
