/** What the letters and crosses of a chart stand for, in words. */
import type { EventMark } from '@/lib/brief/event-marks';
import styles from './history-marks.module.css';

interface EventListProps {
  marks: EventMark[];
  /** One sentence on left-out months; empty: none. */
  leftOut?: string;
}

export function EventList({ marks, leftOut = '' }: EventListProps) {
  if (marks.length === 0 && leftOut === '') return null;
  return (
    <ul className={styles.list} aria-label="Marks on the chart">
      {marks.map(({ letter, text }) => (
        <li key={letter}>
          <span className={styles.listLetter}>{letter}</span> {text}
        </li>
      ))}
      {leftOut === '' ? null : (
        <li>
          <span className={styles.listLetter} aria-hidden="true">
            ×
          </span>{' '}
          {leftOut}
        </li>
      )}
    </ul>
  );
}
