'use client';

import { plainText } from '@/lib/brief/text';
/** What the push does, in sentences, and the odds before and after. */
import type { PushBrief } from '@/lib/brief/types';
import { SentenceText } from '../text/sentence-text';
import styles from './change.module.css';

export function PushAnswer({ push }: { push: PushBrief }) {
  return (
    <>
      <div className={styles.sentences}>
        {push.sentences.map((sentence) => (
          <p key={plainText(sentence)}>
            <SentenceText sentence={sentence} />
          </p>
        ))}
      </div>
      <table className={styles.odds}>
        <caption className="visually-hidden">Odds without and with the push</caption>
        <thead>
          <tr>
            <th scope="col">Odds</th>
            <th scope="col">without</th>
            <th scope="col">with the push</th>
          </tr>
        </thead>
        <tbody>
          {push.odds.map((row) => (
            <tr key={row.outcome}>
              <th scope="row">{row.label}</th>
              <td>{row.before}</td>
              <td>{row.after}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </>
  );
}
