'use client';

/** Issues the forecast as it stands, with or without the push that is being tried above. */
import { useState, useTransition } from 'react';
import { issueForecastAction } from '@/app/_actions/issue-forecast';
import { usePush } from '../change/push-state';
import { Button } from '../controls/button';
import { type Explanation, ProblemNote } from '../controls/problem-note';
import styles from './issue.module.css';

export function IssueForm({ marketId }: { marketId: string }) {
  const { push, name } = usePush();
  const [isWithPush, setIsWithPush] = useState(false);
  const [explanation, setExplanation] = useState<Explanation | null>(null);
  const [isPending, startTransition] = useTransition();
  const issue = () =>
    startTransition(async () => {
      const form = isWithPush && push ? { pushes: [push], scenarioName: name } : { pushes: null };
      setExplanation(await issueForecastAction(marketId, form));
    });
  return (
    <div className={styles.form}>
      {push ? (
        <label className={styles.withPush}>
          <input
            type="checkbox"
            checked={isWithPush}
            onChange={(event) => setIsWithPush(event.target.checked)}
          />
          with the push tried above: {name}
        </label>
      ) : null}
      <Button kind="main" onClick={issue} isBusy={isPending} busyLabel="Issuing">
        Issue this forecast
      </Button>
      <ProblemNote explanation={explanation} />
    </div>
  );
}
