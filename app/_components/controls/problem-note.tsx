/** What did not work: what happened, why, and what to try. Announced when it appears. */
import styles from './problem-note.module.css';

export interface Explanation {
  what: string;
  why?: string;
  tryThis?: string;
}

export function ProblemNote({ explanation }: { explanation: Explanation | null }) {
  return (
    <div role="alert">
      {explanation ? (
        <p className={styles.note}>
          <strong>{explanation.what}</strong> {explanation.why} {explanation.tryThis}
        </p>
      ) : null}
    </div>
  );
}
