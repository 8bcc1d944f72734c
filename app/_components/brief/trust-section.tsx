/** How far can I trust it? What the data cannot tell, how past forecasts did, the sampler's health, what the model leaves out, the cautions. */

import type { ReactNode } from 'react';
import { plainText } from '@/lib/brief/text';
import type { Caution, TrustSection as TrustSectionData } from '@/lib/brief/types';
import { BacktestResult } from '../backtest/backtest-result';
import { Question } from '../frame/question';
import { IdentifiabilityResult } from '../identifiability/identifiability-result';
import { PriorTable } from '../priors/prior-table';
import { SentenceText } from '../text/sentence-text';
import styles from './sections.module.css';

interface TrustSectionProps {
  trust: TrustSectionData;
  cautions: Caution[];
  /** Stands in the place of what more months would tell, while that is not known. */
  decisionStanding?: ReactNode;
  /** Below the assumptions: the form that changes them, or nothing. */
  priorForm?: ReactNode;
  /** Stands in the place of the backtest while there is none. */
  children?: ReactNode;
}

export function TrustSection({ trust, cautions, decisionStanding, priorForm, children }: TrustSectionProps) {
  return (
    <Question id="trust" question={trust.question} note={<SentenceText sentence={trust.note} />}>
      <ul className={styles.unknowns}>
        {trust.unknowns.map((unknown) => (
          <li key={`${unknown.code} ${plainText(unknown.sentence)}`}>
            <SentenceText sentence={unknown.sentence} />
          </li>
        ))}
      </ul>
      {trust.identifiability ? <IdentifiabilityResult part={trust.identifiability} /> : decisionStanding}
      <p className={styles.leftOut}>
        <SentenceText sentence={trust.leftOut} />
      </p>
      {trust.priors ? <PriorTable priors={trust.priors}>{priorForm}</PriorTable> : null}
      {trust.backtest ? <BacktestResult backtest={trust.backtest} /> : children}
      <div className={styles.sampler}>
        <p>
          <SentenceText sentence={trust.sampler.line} />
        </p>
        <details>
          <summary>How the estimate was made</summary>
          <dl className={styles.samplerDetails}>
            {trust.sampler.details.map((detail) => (
              <div key={detail.label}>
                <dt>{detail.label}</dt>
                <dd>{detail.value}</dd>
              </div>
            ))}
          </dl>
        </details>
      </div>
      <ul className={styles.cautions}>
        {cautions.map((caution) => (
          <li key={caution.id}>{caution.text}</li>
        ))}
      </ul>
    </Question>
  );
}
