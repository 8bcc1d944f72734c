'use client';

/** The share to keep, until when and how surely; and the kind of push that is to keep it. */
import { memo } from 'react';
import type { BriefFacts } from '@/lib/brief/facts';
import { spellPushField } from '@/lib/brief/push-words';
import type { Words } from '@/lib/brief/words';
import type { PushKind } from '@/lib/dynamics/push';
import type { Target } from '@/lib/scenario/answers';
import { firstPush, limitsForPush, type MarketScale } from '@/lib/scenario/push-limits';
import type { PricedPush } from '@/lib/scenario/spend';
import { ChoiceField } from '../controls/choice-field';
import { RangeField } from '../controls/range-field';
import styles from './change.module.css';

export interface CounterQuestion {
  target: Target;
  /** Its size is what is asked for. */
  counter: PricedPush;
}

const FIRST_CHANCE = 0.8;
/** The share asked for first lies so far below the one without the pushes. */
const FIRST_LOSS = 0.01;

/** Keep, at the horizon, nearly the share that the outlook gives without any push; answered by the firm that does not push. */
export function firstQuestion(
  { report }: BriefFacts,
  scale: MarketScale,
  pushes: readonly PricedPush[],
): CounterQuestion {
  const firm = pushes[0]?.firm === 1 ? 2 : 1;
  const { q50 } = report.outlook.levels.share;
  const focalShare = q50[q50.length - 1] ?? 0.5;
  const share = Math.min(Math.max((firm === 1 ? focalShare : 1 - focalShare) - FIRST_LOSS, 0.01), 0.99);
  return {
    target: {
      firm,
      share: Math.round(100 * share) / 100,
      month: report.outlook.horizonMonths,
      chance: FIRST_CHANCE,
    },
    counter: firstPush(firm, 'recruits', scale),
  };
}

const KINDS: { value: PushKind; label: string }[] = [
  { value: 'recruits', label: 'recruits' },
  { value: 'growth-lift', label: 'faster growth' },
  { value: 'pull', label: 'pull on the other’s room' },
  { value: 'room', label: 'more room of its own' },
];

/** Smallest and largest share that can be asked for, percent. */
const SHARE_RANGE = { min: 1, max: 99, step: 1 };
const CHANCE_RANGE = { min: 5, max: 95, step: 5 };
const LASTING = 'good';

interface CounterFormProps {
  question: CounterQuestion;
  words: Words;
  scale: MarketScale;
  onChange: (question: CounterQuestion) => void;
}

/** Drawn anew only for another question, not for each move of a push above it. */
export const CounterForm = memo(function CounterForm({ question, words, scale, onChange }: CounterFormProps) {
  const { target, counter } = question;
  const limits = limitsForPush(counter.kind, scale);
  const set = (change: Partial<Target>) => onChange({ ...question, target: { ...target, ...change } });
  const setCounter = (change: Partial<PricedPush>) =>
    onChange({ ...question, counter: { ...counter, ...change } });
  const chooseFirm = (firm: 1 | 2) => {
    const share = Math.round(100 * (1 - target.share)) / 100;
    onChange({
      target: { ...target, firm, share: firm === target.firm ? target.share : share },
      counter: { ...counter, firm },
    });
  };
  return (
    <div className={styles.form} data-firm={target.firm === 1 ? 'focal' : 'rival'}>
      <ChoiceField
        label="Whose share is to be kept"
        value={String(target.firm)}
        options={[
          { value: '1', label: words.focal },
          { value: '2', label: words.rival },
        ]}
        onChange={(event) => chooseFirm(event.target.value === '1' ? 1 : 2)}
      />
      <RangeField
        label="At least"
        suffix="% of users"
        value={Math.round(100 * target.share)}
        {...SHARE_RANGE}
        onChange={(percent) => set({ share: percent / 100 })}
      />
      <RangeField
        label="After"
        suffix={`months: ${words.months.short(words.lastMonth + target.month)}`}
        value={target.month}
        min={1}
        max={scale.horizonMonths}
        step={1}
        onChange={(month) => set({ month })}
      />
      <RangeField
        label="With a chance of"
        suffix="%"
        value={Math.round(100 * target.chance)}
        {...CHANCE_RANGE}
        onChange={(percent) => set({ chance: percent / 100 })}
      />
      <ChoiceField
        label="By"
        value={counter.kind}
        options={KINDS}
        onChange={(event) => setCounter({ kind: event.target.value as PushKind, response: undefined })}
      />
      <RangeField
        label="Answer starts after"
        suffix={`months: ${spellPushField(words, 'startMonth', counter)}`}
        value={counter.startMonth}
        min={0}
        max={limits.startMonth.max}
        step={1}
        onChange={(startMonth) => setCounter({ startMonth })}
      />
      <ChoiceField
        label="Answer lasts"
        value={counter.lengthMonths === null ? LASTING : String(counter.lengthMonths)}
        options={[
          ...[1, 2, 3, 6, 9, 12, 18, 24].map((months) => ({
            value: String(months),
            label: months === 1 ? '1 month' : `${months} months`,
          })),
          { value: LASTING, label: 'for good' },
        ]}
        onChange={({ target: { value } }) =>
          setCounter({ lengthMonths: value === LASTING ? null : Number(value) })
        }
      />
    </div>
  );
});
