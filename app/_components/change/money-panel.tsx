'use client';

/** What is it worth? Margin, discount and months counted; the expected value with its band, and the spend up to which a push pays. */
import { writeBreakEven } from '@/lib/brief/answer-words';
import { writeMoney } from '@/lib/brief/money-words';
import type { BreakEven } from '@/lib/scenario/answers';
import type { ScenarioComparison } from '@/lib/scenario/comparison';
import { findBreakEven } from '@/lib/scenario/find-break-even';
import type { Money } from '@/lib/scenario/money';
import type { PreparedScenario } from '@/lib/scenario/prepare-scenario';
import { MAX_CURRENCY_LENGTH, MAX_DISCOUNT_RATE, MAX_MONEY } from '@/lib/scenario/push-bounds';
import { Button } from '../controls/button';
import { TextField } from '../controls/text-field';
import styles from './change.module.css';
import { NumberInput } from './number-input';
import { OldAnswer } from './old-answer';
import { useScenario } from './scenario-state';
import { ToldSentences } from './told-sentences';
import { useAnswerRun } from './use-answer-run';

/** Plain values to begin from; a tenth a year is common practice for discounting. */
const FIRST_MONEY: Money = {
  currency: 'EUR',
  marginPerUserMonth: { focal: 1, rival: null },
  discountRatePerYear: 0.1,
  months: null,
};

interface MoneyPanelProps {
  prepared: PreparedScenario;
  comparison: ScenarioComparison;
}

export function MoneyPanel({ prepared, comparison }: MoneyPanelProps) {
  const { draft, change, words } = useScenario();
  const { money } = draft;
  const set = (next: Money | null, step: string | null) =>
    change((known) => ({ ...known, money: next }), step);
  return (
    <section className={styles.panel} aria-label="Money">
      <h3 className={styles.figureName}>What is it worth?</h3>
      {money ? (
        <>
          <MoneyFields
            money={money}
            onChange={(next, field) => set({ ...money, ...next }, `money ${field}`)}
          />
          <div aria-live="polite">
            <ToldSentences sentences={comparison.money ? writeMoney(words, comparison.money) : []} />
          </div>
          <BreakEvenQuestion prepared={prepared} money={money} />
          <p className={styles.actions}>
            <Button kind="text" onClick={() => set(null, null)}>
              Count no money
            </Button>
          </p>
        </>
      ) : (
        <p className={styles.actions}>
          <Button onClick={() => set(FIRST_MONEY, null)}>Count money</Button>
        </p>
      )}
    </section>
  );
}

interface MoneyFieldsProps {
  money: Money;
  onChange: (change: Partial<Money>, field: string) => void;
}

function MoneyFields({ money, onChange }: MoneyFieldsProps) {
  const { words, scale } = useScenario();
  const { focal, rival } = money.marginPerUserMonth;
  return (
    <div className={styles.moneyFields}>
      <TextField
        label="Currency, as a label"
        value={money.currency}
        maxLength={MAX_CURRENCY_LENGTH}
        onChange={({ target: { value } }) => value.trim() !== '' && onChange({ currency: value }, 'currency')}
      />
      <NumberInput
        label={`Margin per user and month, ${words.focal}`}
        value={focal}
        max={MAX_MONEY}
        isRequired
        onChange={(margin) => onChange({ marginPerUserMonth: { focal: margin ?? 0, rival } }, 'focal margin')}
      />
      <NumberInput
        label={`The same of ${words.rival}, if known`}
        value={rival}
        max={MAX_MONEY}
        onChange={(margin) => onChange({ marginPerUserMonth: { focal, rival: margin } }, 'rival margin')}
      />
      <NumberInput
        label="Discount a year"
        value={money.discountRatePerYear}
        max={MAX_DISCOUNT_RATE}
        format={{ style: 'percent', maximumFractionDigits: 2 }}
        isRequired
        onChange={(rate) => onChange({ discountRatePerYear: rate ?? 0 }, 'discount')}
      />
      <NumberInput
        label="Months counted, all if empty"
        value={money.months}
        min={1}
        max={scale.horizonMonths}
        onChange={(months) => onChange({ months: months === null ? null : Math.round(months) }, 'months')}
      />
    </div>
  );
}

/** Up to which spend a month the open push pays. */
function BreakEvenQuestion({ prepared, money }: { prepared: PreparedScenario; money: Money }) {
  const { draft, words } = useScenario();
  const push = draft.pushes[draft.open];
  const { answer, isOld, ask, stop } = useAnswerRun<BreakEven>([push, money, ...draft.pushes]);
  if (!push || !(push.size > 0)) return null;
  const pusher = push.firm === 1 ? 'focal' : 'rival';
  if (money.marginPerUserMonth[pusher] === null)
    return (
      <p className={styles.note}>
        With the margin of {words.name(pusher)} known, it can be said up to which spend the open push pays.
      </p>
    );
  const others = draft.pushes.filter((one) => one !== push && one.size > 0);
  const isRunning = answer.state === 'running';
  return (
    <>
      <p className={styles.actions}>
        <Button
          isBusy={isRunning}
          busyLabel="Looking"
          onClick={() => ask(findBreakEven(prepared, { push, pushes: others, money }))}
        >
          Up to which spend does the open push pay?
        </Button>
        {isRunning ? (
          <Button kind="text" onClick={stop}>
            Stop
          </Button>
        ) : null}
      </p>
      <div aria-live="polite">
        {answer.state === 'done' && isOld ? <OldAnswer /> : null}
        {answer.state === 'done' ? <ToldSentences sentences={writeBreakEven(words, answer.answer)} /> : null}
      </div>
    </>
  );
}
