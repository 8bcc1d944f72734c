'use client';

/** Issues the forecast as it stands: alone, or with what is being tried above and scenarios that are kept. */
import { useState, useTransition } from 'react';
import { issueForecastAction } from '@/app/_actions/issue-forecast';
import { MAX_SIDE_BY_SIDE } from '@/lib/scenario/push-bounds';
import type { KeptScenario } from '../change/kept-scenarios';
import { useScenario } from '../change/scenario-state';
import { Button } from '../controls/button';
import { type Explanation, ProblemNote } from '../controls/problem-note';
import styles from './issue.module.css';

/** Key of what is being tried, among the ids of kept scenarios. */
const TRIED = 'tried';

interface IssueFormProps {
  marketId: string;
  scenarios: KeptScenario[];
}

export function IssueForm({ marketId, scenarios }: IssueFormProps) {
  const { pushes, draft, name, asked } = useScenario();
  const [chosen, setChosen] = useState<string[]>([]);
  const [mayTry, setMayTry] = useState(false);
  const [withAnswer, setWithAnswer] = useState(true);
  const [explanation, setExplanation] = useState<Explanation | null>(null);
  const [isPending, startTransition] = useTransition();
  const tried = { id: TRIED, name, pushes, money: draft.money };
  const offered = [...(pushes.length > 0 ? [tried] : []), ...scenarios];
  const taken = offered.filter(({ id }) => chosen.includes(id));
  const issue = () =>
    startTransition(async () => {
      const form = {
        scenarios: taken.map(({ id, name, pushes, money }) => ({
          name,
          pushes,
          money,
          question: id === TRIED && withAnswer ? asked : null,
        })),
        mayReadersTry: mayTry && taken.length > 0,
      };
      setExplanation(await issueForecastAction(marketId, form));
    });
  return (
    <div className={styles.form}>
      {offered.length > 0 ? (
        <fieldset className={styles.withPush}>
          <legend>With these scenarios, up to {MAX_SIDE_BY_SIDE}</legend>
          {offered.map((scenario) => (
            <label key={scenario.id}>
              <input
                type="checkbox"
                checked={chosen.includes(scenario.id)}
                disabled={!chosen.includes(scenario.id) && taken.length >= MAX_SIDE_BY_SIDE}
                onChange={(event) =>
                  setChosen(
                    event.target.checked
                      ? [...chosen, scenario.id]
                      : chosen.filter((one) => one !== scenario.id),
                  )
                }
              />
              {scenario.id === TRIED ? `with the push tried above: ${scenario.name}` : scenario.name}
            </label>
          ))}
          {asked && chosen.includes(TRIED) ? (
            <label>
              <input
                type="checkbox"
                checked={withAnswer}
                onChange={(event) => setWithAnswer(event.target.checked)}
              />
              with the smallest answer to it, as it was looked for
            </label>
          ) : null}
          {taken.length > 0 ? (
            <label>
              <input type="checkbox" checked={mayTry} onChange={(event) => setMayTry(event.target.checked)} />
              readers of a link may move the pushes and see what changes
            </label>
          ) : null}
        </fieldset>
      ) : null}
      <Button kind="main" onClick={issue} isBusy={isPending} busyLabel="Issuing">
        Issue this forecast
      </Button>
      <ProblemNote explanation={explanation} />
    </div>
  );
}
