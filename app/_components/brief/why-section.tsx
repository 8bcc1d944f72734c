/** Why? The phase map beside the odds map, and the parameters in plain units. */
import type { WhySection as WhySectionData } from '@/lib/brief/types';
import { OddsMapFigure, PhaseMapFigure } from '../figures/map-figures';
import { Question } from '../frame/question';
import { SentenceText } from '../text/sentence-text';
import { ParameterTable } from './parameter-table';
import styles from './sections.module.css';

export function WhySection({ why }: { why: WhySectionData }) {
  return (
    <Question id="why" question={why.question} note={<SentenceText sentence={why.note} />}>
      <div className={styles.maps}>
        <PhaseMapFigure map={why.phaseMap} />
        <OddsMapFigure map={why.oddsMap} />
      </div>
      <ParameterTable parameters={why.parameters} />
    </Question>
  );
}
