import type { PaperRow } from './paper-store';

export interface RowNews {
  readonly words: string;
  readonly tone: 'good' | 'look' | 'now' | 'plain';
}

/** How far a card has come, in a word or two. */
export function rowNews(row: PaperRow, asked: boolean): RowNews {
  const { check, inBook, changed } = row;
  if (changed) {
    if (Object.keys(check.problems).length > 0) return { words: 'look again', tone: 'now' };
    if (check.question && !row.text.kept) return { words: 'asked', tone: 'look' };
    if (check.blank) return inBook ? { words: 'taken out', tone: 'look' } : { words: '', tone: 'plain' };
    return { words: inBook ? 'changed' : 'typed', tone: asked ? 'look' : 'plain' };
  }
  if (!inBook) return { words: '', tone: 'plain' };
  switch (inBook.state) {
    case 'stored':
      return { words: 'in the book', tone: 'good' };
    case 'held':
      return { words: 'held', tone: 'look' };
    case 'refused':
      return { words: 'not taken', tone: 'now' };
    case 'waiting':
    case 'later':
      return { words: 'not sent', tone: 'plain' };
  }
}
