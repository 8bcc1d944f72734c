/** Months until the data decide: a bar a horizon, the chance that one outcome is likely, its dark part very likely. */
import type { DecisionFigure as DecisionFigureData } from '@/lib/brief/types';
import { FigureFrame } from '../figures/figure-frame';
import { SentenceText } from '../text/sentence-text';
import styles from './identifiability.module.css';

export function DecisionFigure({ figure }: { figure: DecisionFigureData }) {
  return (
    <div className={styles.block}>
      <p className={styles.headline}>
        <SentenceText sentence={figure.headline} />
      </p>
      <FigureFrame caption={figure.caption} table={figure.table} isDrawn={false}>
        <div className={styles.bars} data-short-labels role="img" aria-label={figure.description}>
          <div className={styles.barRow} data-head>
            <span className={styles.barHead}>likely · very likely</span>
          </div>
          {figure.rows.map((row) => (
            <div key={row.months} className={styles.barRow}>
              <span className={styles.barLabel}>{row.label}</span>
              <span className={styles.track}>
                <span className={styles.likely} style={{ inlineSize: `${row.decided}%` }} />
                <span className={styles.veryLikely} style={{ inlineSize: `${row.sure}%` }} />
              </span>
              <span className={styles.barValue}>
                {row.decidedText} <span className={styles.quiet}>· {row.sureText}</span>
              </span>
            </div>
          ))}
        </div>
      </FigureFrame>
    </div>
  );
}
