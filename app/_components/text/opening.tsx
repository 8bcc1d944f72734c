/** The top of a page that is no brief: its headline with the sentence under it, in the main column. */
import type { ReactNode } from 'react';
import { Headline } from './headline';
import styles from './opening.module.css';

export function Opening({ headline, children }: { headline: ReactNode; children?: ReactNode }) {
  return (
    <div className={styles.opening}>
      <Headline support={children}>{headline}</Headline>
    </div>
  );
}
