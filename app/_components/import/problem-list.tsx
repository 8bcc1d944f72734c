'use client';

/**
 * Every problem of a table: row, column, value, what happened, why, what to try, and what is done about it, which can be changed.
 * On a phone each becomes a block.
 */
import { useState } from 'react';
import { explainProblem } from '@/lib/series/explain';
import { chosenFix, nameFix, problemKey } from '@/lib/series/fixes';
import type { ProblemFix, SeriesMapping, SeriesProblem } from '@/lib/series/types';
import { Button } from '../controls/button';
import styles from './problem-list.module.css';

/** More are shown when asked for. */
const FIRST_SHOWN = 12;

interface ProblemListProps {
  problems: SeriesProblem[];
  /** Choices about problems; absent: nothing can be chosen here. */
  fixes?: SeriesMapping['fixes'];
  onFix?: (key: string, fix: ProblemFix) => void;
}

export function ProblemList({ problems, fixes, onFix }: ProblemListProps) {
  const [isAll, setIsAll] = useState(false);
  if (problems.length === 0) return null;
  const canChoose = onFix !== undefined && problems.some((problem) => problem.fixes);
  const shown = isAll ? problems : problems.slice(0, FIRST_SHOWN);
  return (
    <>
      <table className={styles.table}>
        <caption className={styles.caption}>{countProblems(problems)}</caption>
        <thead>
          <tr>
            <th scope="col">Row</th>
            <th scope="col">Column</th>
            <th scope="col">Value</th>
            <th scope="col">What happened, and what to do</th>
            {canChoose ? <th scope="col">What is done</th> : null}
          </tr>
        </thead>
        <tbody>
          {shown.map((problem) => (
            <ProblemRow
              key={`${problemKey(problem)}|${problem.value}`}
              problem={problem}
              fixes={fixes}
              onFix={canChoose ? onFix : undefined}
            />
          ))}
        </tbody>
      </table>
      {shown.length < problems.length ? (
        <Button kind="text" onClick={() => setIsAll(true)}>
          Show all {problems.length}
        </Button>
      ) : null}
    </>
  );
}

type ProblemRowProps = Pick<ProblemListProps, 'fixes' | 'onFix'> & { problem: SeriesProblem };

function ProblemRow({ problem, fixes, onFix }: ProblemRowProps) {
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
      {onFix ? (
        <td data-label="What is done" className={styles.fix}>
          <FixChoice problem={problem} fixes={fixes} onFix={onFix} />
        </td>
      ) : null}
    </tr>
  );
}

function FixChoice({ problem, fixes, onFix }: ProblemRowProps) {
  const offered = problem.fixes ?? [];
  if (offered.length < 2) return offered[0] ? nameFix(offered[0]) : null;
  return (
    <select
      className={styles.choice}
      aria-label={`What is done: ${explainProblem(problem).what}`}
      value={chosenFix(problem, fixes) ?? ''}
      onChange={(event) => onFix?.(problemKey(problem), event.target.value as ProblemFix)}
    >
      {offered.map((fix) => (
        <option key={fix} value={fix}>
          {nameFix(fix)}
        </option>
      ))}
    </select>
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
