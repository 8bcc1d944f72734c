'use client';

/** What a push costs a month; recruits may be bought, with returns that diminish. */
import { MAX_MONEY } from '@/lib/scenario/push-bounds';
import type { PricedPush, SpendResponse } from '@/lib/scenario/spend';
import styles from './change.module.css';
import { NumberInput } from './number-input';
import { editPush } from './scenario-draft';
import { useScenario } from './scenario-state';

export function SpendFields({ push }: { push: PricedPush }) {
  const { draft, change, words } = useScenario();
  const currency = draft.money?.currency;
  const edit = (next: Partial<PricedPush>, field: string) =>
    change((known) => editPush(known, next), `${draft.open} ${field}`);
  const editResponse = (next: Partial<SpendResponse>) =>
    push.response && edit({ response: { ...push.response, ...next } }, 'response');
  return (
    <div className={styles.spend}>
      <NumberInput
        label={currency ? `Spend a month, ${currency}` : 'Spend a month'}
        value={push.spendPerMonth ?? null}
        max={MAX_MONEY}
        onChange={(spend) => edit({ spendPerMonth: spend ?? (push.response ? 0 : undefined) }, 'spend')}
      />
      {push.kind === 'recruits' ? (
        <label className={styles.check}>
          <input
            type="checkbox"
            checked={push.response !== undefined}
            onChange={(event) => change((known) => editPush(known, buyRecruits(push, event.target.checked)))}
          />
          recruits are bought with it
        </label>
      ) : null}
      {push.response ? (
        <>
          <NumberInput
            label="Cost of the first recruits, each"
            value={push.response.costPerRecruit}
            max={MAX_MONEY}
            isRequired
            onChange={(cost) => cost !== null && cost > 0 && editResponse({ costPerRecruit: cost })}
          />
          <NumberInput
            label="Most that money can buy, a month"
            value={push.response.mostPerMonth}
            max={MAX_MONEY}
            onChange={(most) => editResponse({ mostPerMonth: most })}
          />
          <p className={styles.spendNote}>
            buys {words.numbers.users(push.size)} recruits a month
            {push.response.mostPerMonth === null ? '' : '; half of the most costs twice as much each'}
          </p>
        </>
      ) : null}
    </div>
  );
}

/** Bought recruits begin at the size that was set, at a cost that gives the spend already entered, else at 1 each. */
function buyRecruits({ size, spendPerMonth }: PricedPush, isBought: boolean): Partial<PricedPush> {
  if (!isBought) return { response: undefined };
  const cost = spendPerMonth && size > 0 ? spendPerMonth / size : 1;
  return {
    response: { costPerRecruit: cost, mostPerMonth: null },
    spendPerMonth: spendPerMonth ?? size * cost,
  };
}
