/** Sentences as runs of text with emphasis, and the little grammar that names of firms need. */
import type { Sentence, TextRun, Tone } from './types';

/** A run in the colour of `tone`, in a heavier weight when `strong`. */
export function run(text: string, tone: Tone | null = null, strong = false): TextRun {
  return { text, tone, strong };
}

/** A heavier run without colour. */
export function strong(text: string): TextRun {
  return run(text, null, true);
}

/** Joins plain strings and runs to a sentence; neighbours of the same look become one run, empty ones go. */
export function sentence(...parts: (string | TextRun)[]): Sentence {
  const runs: Sentence = [];
  for (const part of parts) {
    const next = typeof part === 'string' ? run(part) : part;
    if (next.text === '') continue;
    const last = runs.at(-1);
    if (last && last.tone === next.tone && last.strong === next.strong) last.text += next.text;
    else runs.push({ ...next });
  }
  return runs;
}

/** Sentences one after another, a space between them. */
export function joinSentences(sentences: Sentence[]): Sentence {
  return sentence(...sentences.flatMap((one, i) => (i === 0 ? one : [run(' '), ...one])));
}

/** The plain reading of a sentence. */
export function plainText(text: Sentence): string {
  return text.map((part) => part.text).join('');
}

/** "Quillfern’s". */
export function possessive(name: string): string {
  return `${name}’s`;
}

/** "a", "a and b", "a, b and c". */
export function listWords(words: string[]): string {
  if (words.length <= 1) return words.join('');
  return `${words.slice(0, -1).join(', ')} and ${words.at(-1)}`;
}

/** First letter in upper case; the rest as it stands. */
export function capitalise(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
