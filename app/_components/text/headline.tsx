/** The one h1 of a page, with the sentence under it. */
import type { ReactNode } from 'react';
import styles from './headline.module.css';

export function Headline({ children, support }: { children: ReactNode; support?: ReactNode }) {
  return (
    <>
      <h1 className={styles.headline}>{children}</h1>
      {support ? <div className={styles.support}>{support}</div> : null}
    </>
  );
}
