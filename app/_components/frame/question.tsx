/**
 * One question of a document: the question and a short note stand in the margin, the answer in the main column.
 * On a narrow screen the note folds into a disclosure under the question.
 */
import type { ReactNode } from 'react';
import styles from './question.module.css';

interface QuestionProps {
  /** Anchor, also used to name the section. */
  id: string;
  question: string;
  note?: ReactNode;
  /** The first question of a page stands without a rule above it. */
  isFirst?: boolean;
  /** Left out in print. */
  isScreenOnly?: boolean;
  children: ReactNode;
}

export function Question({
  id,
  question,
  note,
  isFirst = false,
  isScreenOnly = false,
  children,
}: QuestionProps) {
  return (
    <section
      className={styles.row}
      data-first={isFirst || undefined}
      data-screen-only={isScreenOnly || undefined}
      aria-labelledby={`${id}-question`}
      id={id}
    >
      <div className={styles.margin}>
        <h2 className={styles.question} id={`${id}-question`}>
          {question}
        </h2>
        {note ? (
          <>
            <div className={styles.note}>{note}</div>
            <details className={styles.foldedNote}>
              <summary>Note</summary>
              <div>{note}</div>
            </details>
          </>
        ) : null}
      </div>
      <div className={styles.answer}>{children}</div>
    </section>
  );
}
