/** What the share hangs on: one bar a strength, from the share at one end of its interval to that at the other. */
import type { SensitivityFigure as SensitivityFigureData, SensitivityLine } from '@/lib/brief/types';
import { FigureFrame } from '../figures/figure-frame';
import { SentenceText } from '../text/sentence-text';
import styles from './identifiability.module.css';

export function SensitivityFigure({ figure }: { figure: SensitivityFigureData }) {
  const [low, high] = figure.domain;
  const placeOf = (share: number) => (100 * (share - low)) / (high - low);
  const spoken = figure.rows.map((row) => `${row.label}: share ${row.text}, explains ${row.explained}`);
  return (
    <div className={styles.block}>
      <p className={styles.headline}>
        <SentenceText sentence={figure.headline} />
      </p>
      <FigureFrame caption={figure.caption} table={figure.table} isDrawn={false}>
        <div className={styles.bars} role="img" aria-label={`${figure.title}. ${spoken.join('. ')}`}>
          <div className={styles.barRow} data-head>
            <span className={styles.barHead}>of the spread</span>
          </div>
          {figure.rows.map((row) => (
            <div key={row.id} className={styles.barRow}>
              <span className={styles.barLabel}>{row.label}</span>
              <span className={styles.track}>
                <Range row={row} placeOf={placeOf} />
              </span>
              <span className={styles.barValue}>{row.explained}</span>
            </div>
          ))}
          <div className={styles.barRow} data-axis>
            <span className={styles.axis}>
              {figure.ticks.map((tick) => (
                <span key={tick.value} style={{ insetInlineStart: `${placeOf(tick.value)}%` }}>
                  {tick.label}
                </span>
              ))}
            </span>
          </div>
        </div>
      </FigureFrame>
    </div>
  );
}

function Range({ row, placeOf }: { row: SensitivityLine; placeOf: (share: number) => number }) {
  if (!row.bar) return null;
  const [from, to] = [placeOf(row.bar.low), placeOf(row.bar.high)];
  return (
    <span
      className={styles.range}
      data-tone={row.tone}
      style={{ insetInlineStart: `${from}%`, inlineSize: `max(${to - from}%, 3px)` }}
    />
  );
}
