/** What more months would tell, which values fit as well, and what else the counts leave open. */
import { plainText } from '@/lib/brief/text';
import type { IdentifiabilityPart } from '@/lib/brief/types';
import { SentenceText } from '../text/sentence-text';
import { DecisionFigure } from './decision-figure';
import { ErrorScales } from './error-scales';
import styles from './identifiability.module.css';
import { ProfileIntervals } from './profile-intervals';

export function IdentifiabilityResult({ part }: { part: IdentifiabilityPart }) {
  return (
    <>
      {part.decision ? <DecisionFigure figure={part.decision} /> : null}
      {part.findings.length > 0 ? (
        <div className={styles.findings}>
          {part.findings.map(({ code, sentence }) => (
            <p key={`${code} ${plainText(sentence)}`}>
              <SentenceText sentence={sentence} />
            </p>
          ))}
        </div>
      ) : null}
      {part.profiles ? <ProfileIntervals profiles={part.profiles} /> : null}
      {part.errorScales ? <ErrorScales scales={part.errorScales} /> : null}
    </>
  );
}
