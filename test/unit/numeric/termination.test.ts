import { describe, expect, it } from 'vitest';
import { isUsableTermination, TERMINATION_REASONS } from '@/lib/numeric/termination';

describe('termination reasons', () => {
  it('have one sentence each, all different', () => {
    const sentences = Object.values(TERMINATION_REASONS).map((reason) => reason.sentence);
    expect(new Set(sentences).size).toBe(sentences.length);
    for (const sentence of sentences) expect(sentence).toMatch(/^[A-Z].*\.$/);
  });

  it('allow only a tested minimum to be used', () => {
    const usable = Object.keys(TERMINATION_REASONS).filter((id) => isUsableTermination(id as 'running'));
    expect(usable).toEqual(['gradient', 'zero-residual']);
  });
});
