/** Draws sentences that `lib/brief` has written: runs of text with a tone and a weight. */
import { Fragment } from 'react';
import type { Sentence, TextRun } from '@/lib/brief/types';
import styles from './sentence-text.module.css';

export function SentenceText({ sentence }: { sentence: Sentence }) {
  return sentence.map((run, index) => (
    // biome-ignore lint/suspicious/noArrayIndexKey: the runs of a sentence have no identity but their place
    <Fragment key={index}>{renderRun(run)}</Fragment>
  ));
}

function renderRun(run: TextRun) {
  const className = run.tone ? styles[run.tone] : undefined;
  if (run.strong) return <strong className={className}>{run.text}</strong>;
  return className ? <span className={className}>{run.text}</span> : run.text;
}
