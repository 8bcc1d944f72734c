import { describe, expect, it } from 'vitest';
import { likelyVerb, wordProbability } from '@/lib/brief/probability-words';

describe('wordProbability', () => {
  // bounds of table 1 of Mastrandrea et al. 2010, each from both sides
  it.each([
    [1, 'virtually certain'],
    [0.991, 'virtually certain'],
    [0.99, 'very likely'],
    [0.901, 'very likely'],
    [0.9, 'likely'],
    [0.88, 'likely'],
    [0.661, 'likely'],
    [0.66, 'about as likely as not'],
    [0.33, 'about as likely as not'],
    [0.329, 'unlikely'],
    [0.1, 'unlikely'],
    [0.099, 'very unlikely'],
    [0.01, 'very unlikely'],
    [0.009, 'exceptionally unlikely'],
    [0, 'exceptionally unlikely'],
  ] as const)('%d is %s', (probability, word) => {
    expect(wordProbability(probability)).toBe(word);
  });

  it('refuses what is no probability', () => {
    for (const wrong of [-0.01, 1.01, Number.NaN]) expect(() => wordProbability(wrong)).toThrow(RangeError);
  });

  it('puts the word before a verb', () => {
    expect(likelyVerb(0.7)).toBe('will likely');
    expect(likelyVerb(0.95)).toBe('will very likely');
    expect(likelyVerb(0.995)).toBe('is virtually certain to');
    expect(likelyVerb(0.995, 'two')).toBe('are virtually certain to');
  });
});
