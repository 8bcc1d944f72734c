/**
 * The odds strip: one bar, four outcomes, widths by the unrounded odds, each outcome told by colour and by pattern.
 * The lines under it carry the numbers, so nothing depends on seeing the bar.
 */
import type { OddsRow, OddsStrip as OddsStripData } from '@/lib/brief/types';
import styles from './odds-strip.module.css';

/** A part thinner than this (percent) is drawn as wide as this, so that a small chance stays visible. */
const LEAST_WIDTH = 0.5;

export function OddsStrip({ odds }: { odds: OddsStripData }) {
  return (
    <div className={styles.odds}>
      <OddsBar rows={odds.rows} description={odds.description} />
      <ul className={styles.labels}>
        {odds.rows.map((row) => (
          <li key={row.outcome} className={styles.label}>
            <span className={styles.swatch} data-tone={row.tone} aria-hidden="true" />
            <strong>{row.percent}</strong> {row.label}
          </li>
        ))}
      </ul>
    </div>
  );
}

interface OddsBarProps {
  rows: Pick<OddsRow, 'outcome' | 'tone' | 'width'>[];
  description: string;
  isThin?: boolean;
}

export function OddsBar({ rows, description, isThin = false }: OddsBarProps) {
  return (
    <div className={styles.bar} data-thin={isThin || undefined} role="img" aria-label={description}>
      {rows
        .filter((row) => row.width > 0)
        .map((row) => (
          <span
            key={row.outcome}
            className={styles.part}
            data-tone={row.tone}
            style={{ flexGrow: Math.max(row.width, LEAST_WIDTH) }}
          />
        ))}
    </div>
  );
}
