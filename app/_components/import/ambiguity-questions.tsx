'use client';

/**
 * A file whose dates or numbers can be read two ways is asked about once, with the first such cell read both ways. The answer
 * stays on the page, so that it can be changed.
 */
import { useId, useRef } from 'react';
import { describePlace } from '@/lib/series/explain';
import { formatMonth } from '@/lib/series/month';
import { readMonthColumn } from '@/lib/series/month-column';
import { readCountColumn } from '@/lib/series/number';
import type { DateOrder, DecimalMark, SeriesMapping, SeriesProblem } from '@/lib/series/types';
import styles from './ambiguity-questions.module.css';

interface AmbiguityQuestionsProps {
  problems: SeriesProblem[];
  mapping: SeriesMapping;
  onChange: (changes: Partial<SeriesMapping>) => void;
}

const ORDERS: { value: DateOrder; name: string }[] = [
  { value: 'day-first', name: 'the day comes first' },
  { value: 'month-first', name: 'the month comes first' },
];
const MARKS: { value: DecimalMark; name: string }[] = [
  { value: 'point', name: 'a point starts the fraction' },
  { value: 'comma', name: 'a comma starts the fraction' },
];

export function AmbiguityQuestions({ problems, mapping, onChange }: AmbiguityQuestionsProps) {
  const month = useFirst(problems, 'month-ambiguous');
  const count = useFirst(problems, 'count-ambiguous');
  return (
    <>
      {month ? (
        <Question
          problem={month}
          chosen={mapping.dateOrder}
          options={ORDERS.map(({ value, name }) => ({ value, name, reading: readMonth(month, value) }))}
          onChoose={(dateOrder) => onChange({ dateOrder })}
        />
      ) : null}
      {count ? (
        <Question
          problem={count}
          chosen={mapping.decimalMark}
          options={MARKS.map(({ value, name }) => ({ value, name, reading: readCount(count, value) }))}
          onChoose={(decimalMark) => onChange({ decimalMark })}
        />
      ) : null}
    </>
  );
}

/** The first problem of a kind; once it was asked about it stays, though an answer takes it off the list. */
function useFirst(problems: SeriesProblem[], code: SeriesProblem['code']): SeriesProblem | null {
  const asked = useRef<SeriesProblem | null>(null);
  asked.current = problems.find((problem) => problem.code === code) ?? asked.current;
  return asked.current;
}

interface QuestionProps<Value extends string> {
  problem: SeriesProblem;
  chosen: Value | undefined;
  options: { value: Value; name: string; reading: string | null }[];
  onChoose: (value: Value) => void;
}

function Question<Value extends string>({ problem, chosen, options, onChoose }: QuestionProps<Value>) {
  const id = useId();
  const readings = options.filter(({ reading }) => reading !== null);
  if (readings.length < 2) return null;
  return (
    <fieldset className={styles.question} data-open={chosen === undefined || undefined}>
      <legend className={styles.legend}>
        {describePlace(problem)}: “{problem.value}” can be read two ways. Which is meant in this file?
      </legend>
      {readings.map(({ value, name, reading }) => (
        <label key={value} className={styles.option}>
          <input type="radio" name={id} checked={chosen === value} onChange={() => onChoose(value)} />
          <span>
            <strong>{reading}</strong>: {name}
          </span>
        </label>
      ))}
    </fieldset>
  );
}

function readMonth({ value }: SeriesProblem, order: DateOrder): string | null {
  const [reading] = readMonthColumn([value ?? ''], order);
  return reading?.kind === 'month' ? formatMonth(reading.month) : null;
}

function readCount({ value }: SeriesProblem, mark: DecimalMark): string | null {
  const [reading] = readCountColumn([value ?? ''], mark);
  return reading?.kind === 'count' ? String(reading.value) : null;
}
