/** The second opinion, folded away: plain fits for either kind of counting error. */
import type { ErrorScaleTable } from '@/lib/brief/types';
import { SentenceText } from '../text/sentence-text';
import styles from './identifiability.module.css';

export function ErrorScales({ scales }: { scales: ErrorScaleTable }) {
  const [kind, verdict, ...heads] = scales.columns;
  return (
    <details className={styles.opinion}>
      <summary>Second opinion</summary>
      <table className={styles.profiles}>
        <caption>
          <SentenceText sentence={scales.caption} />
        </caption>
        <thead>
          <tr>
            <th scope="col">{kind}</th>
            <th scope="col">{verdict}</th>
            {heads.map((head) => (
              <th scope="col" key={head}>
                {head}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {scales.rows.map((row) => (
            <tr key={row.id}>
              <th scope="row">{row.kind}</th>
              <td>{row.verdict}</td>
              {row.values.map((value, i) => (
                <td key={heads[i]} data-head={heads[i]}>
                  {value}
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </details>
  );
}
