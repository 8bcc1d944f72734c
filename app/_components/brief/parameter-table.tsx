/** The parameters in plain units with their intervals and what the data taught. On a phone each line becomes a block. */
import type { ParameterTable as ParameterTableData } from '@/lib/brief/types';
import { SentenceText } from '../text/sentence-text';
import styles from './parameter-table.module.css';

export function ParameterTable({ parameters }: { parameters: ParameterTableData }) {
  return (
    <div className={styles.block}>
      <table className={styles.table}>
        <caption className={styles.caption}>
          <SentenceText sentence={parameters.caption} />
        </caption>
        <thead>
          <tr>
            <th scope="col">Strength</th>
            <th scope="col">Middle</th>
            <th scope="col">Nine in ten between</th>
            <th scope="col">What it says</th>
          </tr>
        </thead>
        <tbody>
          {parameters.rows.map((row) => (
            <tr key={row.id}>
              <th scope="row" data-firm={row.firm}>
                {row.label}
              </th>
              <td className={styles.value}>{row.value}</td>
              <td className={styles.interval}>{row.interval}</td>
              <td>
                {row.meaning} <span className={styles.learnt}>{row.learnt}</span>
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
