import { LIMITS } from '../../shared/contract/limits.js';

/** What a letter says: plain text first, the same in simple HTML. */
export interface LetterWords {
  readonly subject: string;
  readonly text: string;
  readonly html: string;
}

interface Paragraph {
  readonly words: string;
  /** The paragraph is this address. */
  readonly link?: string;
}

export function inviteWords(mill: string, name: string, link: string): LetterWords {
  return letter(`Your sign-in to the shift book of ${mill}`, [
    { words: `Hello ${name},` },
    {
      words: `you have a sign-in to the shift book of ${mill}. Choose your password by this link:`,
    },
    { words: link, link },
    {
      words: `It works once, and for ${LIMITS.inviteLink / 86_400_000} days. After that, ask the manager for a new one.`,
    },
    { words: 'If you do not work there, forget this letter: nothing happens without the link.' },
  ]);
}

export function resetWords(mill: string, name: string, link: string): LetterWords {
  return letter(`A new password for the shift book of ${mill}`, [
    { words: `Hello ${name},` },
    { words: `a new password was asked for to the shift book of ${mill}. Choose it by this link:` },
    { words: link, link },
    {
      words: `It works once, and for ${LIMITS.resetLink / 60_000} minutes. Your old password works until then, and ends with it; so do your sign-ins elsewhere.`,
    },
    { words: 'If you did not ask, forget this letter: without the link nothing changes.' },
  ]);
}

export function testWords(mill: string, by: string): LetterWords {
  return letter(`A test letter from the shift book of ${mill}`, [
    { words: `${by} tries whether letters of the shift book of ${mill} arrive.` },
    { words: 'This one did. There is nothing to do.' },
  ]);
}

function letter(subject: string, paragraphs: readonly Paragraph[]): LetterWords {
  return {
    subject,
    text: `${paragraphs.map(({ words }) => words).join('\n\n')}\n`,
    html: `<!doctype html><html lang="en"><body style="font-family:sans-serif;font-size:16px;line-height:1.5;max-width:36em">${paragraphs.map(asHtml).join('')}</body></html>`,
  };
}

function asHtml({ words, link }: Paragraph): string {
  const text = escaped(words);
  return link === undefined ? `<p>${text}</p>` : `<p><a href="${escaped(link)}">${text}</a></p>`;
}

function escaped(words: string): string {
  const named: Record<string, string> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;' };
  return words.replace(/[&<>"]/g, (letter) => named[letter] ?? letter);
}
