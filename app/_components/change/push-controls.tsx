'use client';

/** Plain ranges with their values beside them: who pushes, what, from when, how long, how much, built up how, with what echo, at what price. */
import { describeKind } from '@/lib/brief/push-kind-words';
import { spellPushField } from '@/lib/brief/push-words';
import type { PushKind } from '@/lib/dynamics/push';
import { limitsForPush, type Range } from '@/lib/scenario/push-limits';
import type { PricedPush } from '@/lib/scenario/spend';
import { RangeField } from '../controls/range-field';
import { ViewSwitch } from '../controls/view-switch';
import styles from './change.module.css';
import { StartingPointChoice } from './push-tabs';
import { changeKind, editPush } from './scenario-draft';
import { useScenario } from './scenario-state';
import { SpendFields } from './spend-fields';

const KINDS = [
  { id: 'recruits', label: 'Recruits' },
  { id: 'growth-lift', label: 'Faster growth' },
  { id: 'pull', label: 'Pull' },
  { id: 'room', label: 'Room' },
] as const satisfies { id: PushKind; label: string }[];

const LENGTHS = [
  { id: 'time', label: 'For a time' },
  { id: 'good', label: 'For good' },
] as const;

const SIZE_LABELS: Record<Exclude<PushKind, 'recruits'>, string> = {
  'growth-lift': 'Growth is higher by',
  pull: 'Each user takes more by',
  room: 'Its own room is larger by',
};

export function PushControls({ isDisabled }: { isDisabled: boolean }) {
  const { words, draft, change, scale } = useScenario();
  const push = draft.pushes[draft.open];
  if (!push) return null;
  const firms = [
    { id: '2', label: words.rival },
    { id: '1', label: words.focal },
  ] as const;
  const kind = describeKind(words, push);
  return (
    <fieldset
      className={styles.controls}
      data-firm={push.firm === 1 ? 'focal' : 'rival'}
      disabled={isDisabled}
    >
      <legend className="visually-hidden">A push to try</legend>
      <ViewSwitch
        label="Who pushes"
        views={firms}
        value={push.firm === 1 ? '1' : '2'}
        onChange={(firm) => change((known) => editPush(known, { firm: firm === '1' ? 1 : 2 }))}
      />
      <StartingPointChoice />
      <ViewSwitch
        label="What the push brings"
        views={KINDS}
        value={push.kind}
        onChange={(next) => change((known) => changeKind(known, next, scale))}
      />
      <SizeField push={push} isDisabled={isDisabled} />
      <TimeFields push={push} isDisabled={isDisabled} />
      <SpendFields push={push} />
      <details className={styles.kindWords}>
        <summary>What it changes, and what stays</summary>
        <p>{kind.does}</p>
        <p>{kind.fixed}</p>
      </details>
    </fieldset>
  );
}

interface FieldProps {
  push: PricedPush;
  isDisabled: boolean;
}

/** @param factor units of the control in one unit of the range: 100 for percent of a fraction */
function rangeOf({ min, max, step }: Range, factor = 1): Omit<Range, 'first'> {
  return { min: min * factor, max: max * factor, step: step * factor };
}

/** A control for one number of the open push; its moves are undone as one step. */
function useField(): (field: keyof PricedPush, value: number | null) => void {
  const { change, draft } = useScenario();
  return (field, value) => change((known) => editPush(known, { [field]: value }), `${draft.open} ${field}`);
}

function SizeField({ push, isDisabled }: FieldProps) {
  const { scale } = useScenario();
  const set = useField();
  const { size } = limitsForPush(push.kind, scale);
  if (push.response) return null;
  return push.kind === 'recruits' ? (
    <RangeField
      label="Recruits"
      suffix="a month"
      value={push.size}
      {...rangeOf({ ...size, max: Math.max(size.max, push.size) })}
      isDisabled={isDisabled}
      onChange={(value) => set('size', value)}
    />
  ) : (
    <RangeField
      label={SIZE_LABELS[push.kind]}
      suffix="%"
      value={Math.round(100 * push.size)}
      {...rangeOf({ ...size, max: Math.max(size.max, push.size) }, 100)}
      isDisabled={isDisabled}
      onChange={(percent) => set('size', percent / 100)}
    />
  );
}

function TimeFields({ push, isDisabled }: FieldProps) {
  const { words, scale, change } = useScenario();
  const set = useField();
  const limits = limitsForPush(push.kind, scale);
  const isLasting = push.lengthMonths === null;
  return (
    <>
      <RangeField
        label="Starts after"
        suffix={`months: ${spellPushField(words, 'startMonth', push)}`}
        value={push.startMonth}
        {...rangeOf(limits.startMonth)}
        isDisabled={isDisabled}
        onChange={(value) => set('startMonth', value)}
      />
      <ViewSwitch
        label="How long it lasts"
        views={LENGTHS}
        value={isLasting ? 'good' : 'time'}
        onChange={(length) =>
          change((known) =>
            editPush(known, { lengthMonths: length === 'good' ? null : limits.lengthMonths.first }),
          )
        }
      />
      {push.lengthMonths === null ? null : (
        <RangeField
          label="Lasts"
          suffix="months"
          value={push.lengthMonths}
          {...rangeOf(limits.lengthMonths)}
          isDisabled={isDisabled}
          onChange={(value) => set('lengthMonths', value)}
        />
      )}
      <RangeField
        label="Builds up over"
        suffix="months"
        value={push.rampMonths}
        {...rangeOf(limits.rampMonths)}
        isDisabled={isDisabled}
        onChange={(value) => set('rampMonths', value)}
      />
      {isLasting ? null : (
        <RangeField
          label="Then halves every"
          suffix="months"
          value={push.carryOverHalfLifeMonths}
          {...rangeOf(limits.carryOverHalfLifeMonths)}
          isDisabled={isDisabled}
          onChange={(value) => set('carryOverHalfLifeMonths', value)}
        />
      )}
    </>
  );
}
