'use client';

/** What was understood from the table: one sentence, how it was read, the chart and the months, and every problem. */
import { LOCALE } from '@/app/_lib/locale';
import { createMonthFormat } from '@/lib/brief/month-words';
import { MIN_MONTHS_TO_FIT } from '@/lib/series/limits';
import type { MonthlySeries, ProblemFix } from '@/lib/series/types';
import { HistoryFigure } from '../figures/history-figure';
import { ProblemList } from './problem-list';
import { isAsked, type Understood } from './understood';
import styles from './understood-step.module.css';

interface UnderstoodStepProps {
  understood: Understood;
  onFix: (key: string, fix: ProblemFix) => void;
  focalName: string;
  rivalName: string;
  unit: string;
}

export function UnderstoodStep({ understood, onFix, focalName, rivalName, unit }: UnderstoodStepProps) {
  const { reading, notes, mapping, canFit } = understood;
  return (
    <div>
      <p className={styles.summary} aria-live="polite">
        {reading.series ? describeSeries(reading.series) : 'Nothing could be read as counts yet.'}
      </p>
      {notes.length > 0 ? <p className={styles.notes}>{notes.join(' ')}</p> : null}
      {reading.series ? (
        <HistoryFigure series={reading.series} focalName={focalName} rivalName={rivalName} unit={unit} />
      ) : null}
      {reading.problems.some(isAsked) ? (
        <p className={styles.blocked}>
          First answer what is asked above: cells that it concerns are not read yet.
        </p>
      ) : null}
      <ProblemList
        problems={reading.problems.filter((problem) => !isAsked(problem))}
        fixes={mapping?.fixes}
        onFix={onFix}
      />
      {canFit ? null : (
        <p className={styles.blocked}>
          Nothing can be stored until what concerns the whole file is corrected.
        </p>
      )}
    </div>
  );
}

function describeSeries({ firstMonth, focal, rival }: MonthlySeries): string {
  const months = createMonthFormat(LOCALE);
  const length = focal.length;
  const last = firstMonth + length - 1;
  const known = focal.filter((count, index) => count !== null && rival[index] !== null).length;
  const span =
    length === 1
      ? `One month, ${months.long(last)}`
      : `${length} months, ${months.long(firstMonth)} to ${months.long(last)}`;
  const complete = known === length ? 'both firms known in each' : `both firms known in ${known}`;
  const enough = known < MIN_MONTHS_TO_FIT ? ` A fit needs ${MIN_MONTHS_TO_FIT}.` : '';
  return `${span}; ${complete}.${enough}`;
}
