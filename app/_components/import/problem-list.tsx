/** Every problem of a table: row, column, value, what happened, why, what to try. On a phone each becomes a block. */
import { explainProblem } from '@/lib/series/explain';
import type { SeriesProblem } from '@/lib/series/types';
import styles from './problem-list.module.css';

export function ProblemList({ problems }: { problems: SeriesProblem[] }) {
  if (problems.length === 0) return null;
  return (
    <table className={styles.table}>
      <caption className={styles.caption}>{countProblems(problems)}</caption>
      <thead>
        <tr>
          <th scope="col">Row</th>
          <th scope="col">Column</th>
          <th scope="col">Value</th>
          <th scope="col">What happened, and what to do</th>
        </tr>
      </thead>
      <tbody>
        {problems.map((problem) => (
          <ProblemRow
            key={[problem.code, problem.row, problem.column, problem.value].join('|')}
            problem={problem}
          />
        ))}
      </tbody>
    </table>
  );
}

function ProblemRow({ problem }: { problem: SeriesProblem }) {
  const { what, why, tryThis } = explainProblem(problem);
  return (
    <tr data-severity={problem.severity}>
      <td data-label="Row">{problem.row ?? 'whole file'}</td>
      <td data-label="Column">{problem.column ?? ''}</td>
      <td data-label="Value" className={styles.value}>
        {problem.value ?? ''}
      </td>
      <td>
        <strong className={styles.what}>
          {problem.severity === 'error' ? '▲ ' : ''}
          {what}
        </strong>{' '}
        {why} {tryThis}
      </td>
    </tr>
  );
}

function countProblems(problems: SeriesProblem[]): string {
  const errors = problems.filter((problem) => problem.severity === 'error').length;
  const warnings = problems.length - errors;
  const parts = [
    errors > 0 ? `${errors} to correct` : '',
    warnings > 0 ? `${warnings} to look at` : '',
  ].filter(Boolean);
  return parts.join(', ');
}
