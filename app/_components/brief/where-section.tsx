/** Where is it heading? The verdict, the odds strip, the main chart and the milestones. */

import { plainText } from '@/lib/brief/text';
import type { WhereSection as WhereSectionData } from '@/lib/brief/types';
import { ForecastFigure } from '../figures/forecast-figure';
import { Question } from '../frame/question';
import { Headline } from '../text/headline';
import { SentenceText } from '../text/sentence-text';
import { OddsStrip } from './odds-strip';
import styles from './sections.module.css';

export function WhereSection({ where }: { where: WhereSectionData }) {
  return (
    <Question id="where" question={where.question} note={<SentenceText sentence={where.note} />} isFirst>
      <Headline
        support={where.verdict.support.map((sentence) => (
          <p key={plainText(sentence)}>
            <SentenceText sentence={sentence} />
          </p>
        ))}
      >
        <SentenceText sentence={where.verdict.headline} />
      </Headline>
      <OddsStrip odds={where.odds} />
      <ForecastFigure figure={where.forecast} />
      {where.milestones.length > 0 ? (
        <dl className={styles.milestones}>
          {where.milestones.map((milestone) => (
            <div key={milestone.id}>
              <dt>{milestone.label}</dt>
              <dd className={styles.milestoneValue}>{milestone.value}</dd>
              {milestone.chance ? <dd className={styles.milestoneChance}>{milestone.chance}</dd> : null}
            </div>
          ))}
        </dl>
      ) : null}
    </Question>
  );
}
