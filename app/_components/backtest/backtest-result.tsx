/** How past forecasts did: who was better, a row a method, and all scores to fold away. */
import { plainText } from '@/lib/brief/text';
import type { BacktestPart } from '@/lib/brief/types';
import { NumbersTable } from '../figures/numbers-table';
import { SentenceText } from '../text/sentence-text';
import styles from './backtest.module.css';

export function BacktestResult({ backtest }: { backtest: BacktestPart }) {
  return (
    <div className={styles.block}>
      <p className={styles.verdict}>
        <SentenceText sentence={backtest.verdict} />
      </p>
      <table className={styles.table}>
        <caption>
          <SentenceText sentence={backtest.caption} />
        </caption>
        <thead>
          <tr>
            <th scope="col">Method</th>
            <th scope="col">Typical error</th>
            <th scope="col">Inside the 90&nbsp;% band</th>
          </tr>
        </thead>
        <tbody>
          {backtest.rows.map((row) => (
            <tr key={row.method} data-own={row.isOwn || undefined}>
              <th scope="row">
                {row.label}
                {row.note ? <span className={styles.note}> {row.note}</span> : null}
              </th>
              <td>{row.error}</td>
              <td>{row.inside}</td>
            </tr>
          ))}
        </tbody>
      </table>
      <NumbersTable table={backtest.table} />
      <div className={styles.details}>
        {backtest.details.map((detail) => (
          <p key={plainText(detail)}>
            <SentenceText sentence={detail} />
          </p>
        ))}
      </div>
    </div>
  );
}
