import { sentenceOf } from '@shared/contract/errors';
import { outcomeOf } from './answer';

function sentence(retryAfter: number | null): string {
  const code = 'too-many-tries';
  const problem = { type: 'about:blank', title: '', status: 429, code } as const;
  const outcome = outcomeOf({ kind: 'problem', status: 429, code, problem, retryAfter });
  return outcome.ok ? 'done' : outcome.sentence;
}

describe('outcomeOf', () => {
  it('says how long to wait after too many tries, rounded up', () => {
    expect(sentence(241_000)).toBe('Too many tries. Wait 5 min, then try again.');
    expect(sentence(12_000)).toBe('Too many tries. Wait 12 s, then try again.');
  });

  it('has the code’s own sentence where the server does not say', () => {
    expect(sentence(null)).toBe(sentenceOf('too-many-tries'));
  });
});
