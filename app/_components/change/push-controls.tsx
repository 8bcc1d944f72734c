'use client';

/** Plain ranges with their values beside them: who pushes, what, from when, how long, how much, with what echo. */
import { LOCALE } from '@/app/_lib/locale';
import { createMonthFormat } from '@/lib/brief/month-words';
import { RangeField } from '../controls/range-field';
import { ViewSwitch } from '../controls/view-switch';
import styles from './change.module.css';
import { type DraftKind, type PushDraft, RANGES, rangeOfRecruits } from './push-draft';
import { usePush } from './push-state';

const KINDS = [
  { id: 'recruits', label: 'Recruits' },
  { id: 'growth-lift', label: 'Faster growth' },
] as const satisfies { id: DraftKind; label: string }[];

const LENGTHS = [
  { id: 'time', label: 'For a time' },
  { id: 'good', label: 'For good' },
] as const;

const months = createMonthFormat(LOCALE);

export function PushControls({ isDisabled }: { isDisabled: boolean }) {
  const { market, draft, change } = usePush();
  const firms = [
    { id: 'rival', label: market.rivalName },
    { id: 'focal', label: market.focalName },
  ] as const satisfies { id: PushDraft['firm']; label: string }[];
  return (
    <fieldset className={styles.controls} data-firm={draft.firm} disabled={isDisabled}>
      <legend className="visually-hidden">A push to try</legend>
      <ViewSwitch label="Who pushes" views={firms} value={draft.firm} onChange={(firm) => change({ firm })} />
      <ViewSwitch
        label="What the push brings"
        views={KINDS}
        value={draft.kind}
        onChange={(kind) => change({ kind })}
      />
      <SizeField isDisabled={isDisabled} />
      <RangeField
        label="Starts after"
        suffix={`months: ${months.short(market.lastMonth + draft.startMonth)}`}
        value={draft.startMonth}
        {...RANGES.startMonth}
        isDisabled={isDisabled}
        onChange={(startMonth) => change({ startMonth })}
      />
      <ViewSwitch
        label="How long it lasts"
        views={LENGTHS}
        value={draft.isLasting ? 'good' : 'time'}
        onChange={(length) => change({ isLasting: length === 'good' })}
      />
      {draft.isLasting ? null : <TimeFields isDisabled={isDisabled} />}
    </fieldset>
  );
}

function SizeField({ isDisabled }: { isDisabled: boolean }) {
  const { market, draft, change } = usePush();
  return draft.kind === 'recruits' ? (
    <RangeField
      label="Recruits"
      suffix="a month"
      value={draft.recruits}
      {...rangeOfRecruits(market)}
      isDisabled={isDisabled}
      onChange={(recruits) => change({ recruits })}
    />
  ) : (
    <RangeField
      label="Growth is higher by"
      suffix="%"
      value={Math.round(100 * draft.lift)}
      {...RANGES.liftPercent}
      isDisabled={isDisabled}
      onChange={(percent) => change({ lift: percent / 100 })}
    />
  );
}

function TimeFields({ isDisabled }: { isDisabled: boolean }) {
  const { draft, change } = usePush();
  return (
    <>
      <RangeField
        label="Lasts"
        suffix="months"
        value={draft.lengthMonths}
        {...RANGES.lengthMonths}
        isDisabled={isDisabled}
        onChange={(lengthMonths) => change({ lengthMonths })}
      />
      <RangeField
        label="Then halves every"
        suffix="months"
        value={draft.carryOverHalfLifeMonths}
        {...RANGES.carryOverHalfLifeMonths}
        isDisabled={isDisabled}
        onChange={(carryOverHalfLifeMonths) => change({ carryOverHalfLifeMonths })}
      />
    </>
  );
}
