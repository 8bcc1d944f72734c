/** Values that fit the past nearly as well as the best: a row a strength. */
import type { ProfileTable } from '@/lib/brief/types';
import { NumbersTable } from '../figures/numbers-table';
import { SentenceText } from '../text/sentence-text';
import styles from './identifiability.module.css';

export function ProfileIntervals({ profiles }: { profiles: ProfileTable }) {
  return (
    <div className={styles.block}>
      <table className={styles.profiles}>
        <caption>
          <SentenceText sentence={profiles.caption} />
        </caption>
        <thead>
          <tr>
            <th scope="col">Strength</th>
            <th scope="col">Best</th>
            <th scope="col">Fits as well</th>
          </tr>
        </thead>
        <tbody>
          {profiles.rows.map((row) => (
            <tr key={row.id}>
              <th scope="row">{row.label}</th>
              <td>{row.best}</td>
              <td>{row.interval}</td>
            </tr>
          ))}
        </tbody>
      </table>
      <NumbersTable table={profiles.table} />
    </div>
  );
}
