'use client';

/** Plain ranges with their values beside them: who pushes, what, from when, how long, how much, with what echo. */
import { spellPushField } from '@/lib/brief/push-words';
import type { Range } from '@/lib/scenario/push-limits';
import { RangeField } from '../controls/range-field';
import { ViewSwitch } from '../controls/view-switch';
import styles from './change.module.css';
import { type DraftKind, limitsOf, type PushDraft } from './push-draft';
import { usePush } from './push-state';

const KINDS = [
  { id: 'recruits', label: 'Recruits' },
  { id: 'growth-lift', label: 'Faster growth' },
] as const satisfies { id: DraftKind; label: string }[];

const LENGTHS = [
  { id: 'time', label: 'For a time' },
  { id: 'good', label: 'For good' },
] as const;

export function PushControls({ isDisabled }: { isDisabled: boolean }) {
  const { words, scale, draft, change, push } = usePush();
  const firms = [
    { id: 'rival', label: words.rival },
    { id: 'focal', label: words.focal },
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
        suffix={push ? `months: ${spellPushField(words, 'startMonth', push)}` : 'months'}
        value={draft.startMonth}
        {...rangeOf(limitsOf(draft, scale).startMonth)}
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

/** @param factor units of the control in one unit of the range: 100 for percent of a fraction */
function rangeOf({ min, max, step }: Range, factor = 1): Omit<Range, 'first'> {
  return { min: min * factor, max: max * factor, step: step * factor };
}

function SizeField({ isDisabled }: { isDisabled: boolean }) {
  const { scale, draft, change } = usePush();
  const { size } = limitsOf(draft, scale);
  const set = (value: number) => change({ sizes: { ...draft.sizes, [draft.kind]: value } });
  return draft.kind === 'recruits' ? (
    <RangeField
      label="Recruits"
      suffix="a month"
      value={draft.sizes.recruits}
      {...rangeOf(size)}
      isDisabled={isDisabled}
      onChange={set}
    />
  ) : (
    <RangeField
      label="Growth is higher by"
      suffix="%"
      value={Math.round(100 * draft.sizes['growth-lift'])}
      {...rangeOf(size, 100)}
      isDisabled={isDisabled}
      onChange={(percent) => set(percent / 100)}
    />
  );
}

function TimeFields({ isDisabled }: { isDisabled: boolean }) {
  const { scale, draft, change } = usePush();
  const limits = limitsOf(draft, scale);
  return (
    <>
      <RangeField
        label="Lasts"
        suffix="months"
        value={draft.lengthMonths}
        {...rangeOf(limits.lengthMonths)}
        isDisabled={isDisabled}
        onChange={(lengthMonths) => change({ lengthMonths })}
      />
      <RangeField
        label="Then halves every"
        suffix="months"
        value={draft.carryOverHalfLifeMonths}
        {...rangeOf(limits.carryOverHalfLifeMonths)}
        isDisabled={isDisabled}
        onChange={(carryOverHalfLifeMonths) => change({ carryOverHalfLifeMonths })}
      />
    </>
  );
}
