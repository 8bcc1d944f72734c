/** Sentences of an answer, one paragraph each. */
import { plainText } from '@/lib/brief/text';
import type { Sentence } from '@/lib/brief/types';
import { SentenceText } from '../text/sentence-text';
import styles from './change.module.css';

export function ToldSentences({ sentences }: { sentences: Sentence[] }) {
  return sentences.map((one) => (
    <p key={plainText(one)} className={styles.told}>
      <SentenceText sentence={one} />
    </p>
  ));
}
