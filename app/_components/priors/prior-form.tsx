'use client';

/** Changes what is assumed before the counts, for those who may; a fit with it follows at once. */
import { useState, useTransition } from 'react';
import { changePriorsAction } from '@/app/_actions/change-priors';
import { NO_COMPETITION_RANGE } from '@/lib/estimate/prior-schema';
import { USUAL_PRIORS } from '@/lib/estimate/priors';
import type { PriorSettings } from '@/lib/estimate/types';
import { Button } from '../controls/button';
import { NumberLocale } from '../controls/number-locale';
import { type Explanation, ProblemNote } from '../controls/problem-note';
import {
  FACTOR_RANGE,
  middleRange,
  PRIOR_IDS,
  type PriorDraft,
  type PriorId,
  toDraft,
  toSettings,
} from './prior-draft';
import { PriorNumber } from './prior-number';
import styles from './priors.module.css';

interface PriorFormProps {
  marketId: string;
  /** null: the usual ones. */
  stored: PriorSettings | null;
  names: { focalName: string; rivalName: string };
}

const PERCENT: Intl.NumberFormatOptions = { style: 'percent', maximumSignificantDigits: 3 };
const PLAIN: Intl.NumberFormatOptions = { maximumSignificantDigits: 3 };

export function PriorForm({ marketId, stored, names }: PriorFormProps) {
  const settings = stored ?? USUAL_PRIORS;
  const [draft, setDraft] = useState<PriorDraft>(() => toDraft(settings));
  const [explanation, setExplanation] = useState<Explanation | null>(null);
  const [isPending, startTransition] = useTransition();
  const labels = labelPriors(names);

  const send = (priors: PriorSettings | null) =>
    startTransition(async () => {
      const refusal = await changePriorsAction(marketId, { priors });
      setExplanation(refusal);
      if (!refusal) setDraft(toDraft(priors ?? USUAL_PRIORS));
    });
  const setMiddle = (id: PriorId, value: number) =>
    setDraft({ ...draft, middles: { ...draft.middles, [id]: value } });
  const setFactor = (id: PriorId, value: number) =>
    setDraft({ ...draft, factors: { ...draft.factors, [id]: value } });

  return (
    <NumberLocale>
      <div className={styles.form} data-screen-only>
        <p className={styles.lead}>
          Change them only for what is known from elsewhere, not to please the outcome. A new fit follows.
        </p>
        {PRIOR_IDS.map((id) => (
          <fieldset key={id} className={styles.pair}>
            <legend>{labels[id].legend}</legend>
            <PriorNumber
              label={labels[id].middle}
              value={draft.middles[id]}
              range={middleRange(id)}
              format={id === 'saturation' ? PLAIN : PERCENT}
              onChange={(value) => setMiddle(id, value)}
            />
            <PriorNumber
              label="Nine in ten within a factor of"
              value={draft.factors[id]}
              range={FACTOR_RANGE}
              format={PLAIN}
              onChange={(value) => setFactor(id, value)}
            />
          </fieldset>
        ))}
        <fieldset className={styles.pair}>
          <legend>Whether they compete</legend>
          <PriorNumber
            label="Chance that they hardly do"
            value={draft.noCompetition}
            range={NO_COMPETITION_RANGE}
            format={PERCENT}
            onChange={(noCompetition) => setDraft({ ...draft, noCompetition })}
          />
        </fieldset>
        <ProblemNote explanation={explanation} />
        <div className={styles.buttons}>
          <Button
            isBusy={isPending}
            busyLabel="Asking for a fit"
            onClick={() => send(toSettings(draft, settings))}
          >
            Fit with these
          </Button>
          {stored ? (
            <Button kind="text" isBusy={isPending} onClick={() => send(null)}>
              Back to the usual
            </Button>
          ) : null}
        </div>
      </div>
    </NumberLocale>
  );
}

function labelPriors({ focalName, rivalName }: PriorFormProps['names']) {
  return {
    growth: { legend: 'Growth of either firm when small', middle: 'Middle, a month' },
    saturation: { legend: 'Saturation level of either firm', middle: 'Middle, times its largest count' },
    alpha: {
      legend: `Room that ${rivalName} takes from ${focalName}, if they compete`,
      middle: 'Middle, of all its room',
    },
    beta: {
      legend: `Room that ${focalName} takes from ${rivalName}, if they compete`,
      middle: 'Middle, of all its room',
    },
  };
}
