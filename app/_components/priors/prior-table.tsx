/** What was assumed before the counts, folded away; what is not the usual is marked in words. The form that changes it comes below. */
import type { ReactNode } from 'react';
import type { PriorLine, PriorTable as PriorTableData } from '@/lib/brief/types';
import { SentenceText } from '../text/sentence-text';
import styles from './priors.module.css';

interface PriorTableProps {
  priors: PriorTableData;
  children?: ReactNode;
}

const MARKS: Record<PriorLine['mark'], string> = {
  usual: 'usual',
  changed: 'changed from the usual',
  addressable: 'from the addressable market',
};

export function PriorTable({ priors, children }: PriorTableProps) {
  return (
    <details className={styles.disclosure}>
      <summary>{priors.title}</summary>
      <table className={styles.table}>
        <caption>
          <SentenceText sentence={priors.caption} />
        </caption>
        <thead>
          <tr>
            <th scope="col">Assumption</th>
            <th scope="col">Middle</th>
            <th scope="col">Nine in ten between</th>
            <th scope="col">Which</th>
          </tr>
        </thead>
        <tbody>
          {priors.rows.map((row) => (
            <tr key={row.id}>
              <th scope="row">{row.label}</th>
              <td className={styles.middle}>{row.middle}</td>
              <td className={styles.interval}>{row.interval}</td>
              <td data-mark={row.mark}>{MARKS[row.mark]}</td>
            </tr>
          ))}
        </tbody>
      </table>
      {children}
    </details>
  );
}
