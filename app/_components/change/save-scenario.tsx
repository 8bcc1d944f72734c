'use client';

/** Keeps the push under a name, and brings a kept one back into the controls. */
import { useState, useTransition } from 'react';
import { saveScenarioAction } from '@/app/_actions/save-scenario';
import type { FormRefusal } from '@/app/_lib/form-refusal';
import type { Push } from '@/lib/dynamics/push';
import { Button } from '../controls/button';
import { ProblemNote } from '../controls/problem-note';
import { TextField } from '../controls/text-field';
import styles from './change.module.css';
import { fromPush } from './push-draft';
import { usePush } from './push-state';

export interface KeptScenario {
  id: string;
  name: string;
  pushes: Push[];
}

interface SaveScenarioProps {
  marketId: string;
  scenarios: KeptScenario[];
  canWrite: boolean;
}

export function SaveScenario({ marketId, scenarios, canWrite }: SaveScenarioProps) {
  if (!canWrite && scenarios.length === 0) return null;
  return (
    <div className={styles.save}>
      {canWrite ? <SaveForm marketId={marketId} /> : null}
      <KeptScenarios scenarios={scenarios} />
    </div>
  );
}

function SaveForm({ marketId }: { marketId: string }) {
  const { push, name: suggested } = usePush();
  const [typed, setTyped] = useState<string | null>(null);
  const [refusal, setRefusal] = useState<FormRefusal | null>(null);
  const [isPending, startTransition] = useTransition();
  const save = () =>
    startTransition(async () => {
      if (!push) return;
      const next = await saveScenarioAction(marketId, { name: typed ?? suggested, pushes: [push] });
      setRefusal(next);
      if (!next) setTyped(null);
    });
  return (
    <>
      <div className={styles.saveLine}>
        <TextField
          label="Keep this push as a scenario"
          value={typed ?? suggested}
          onChange={(event) => setTyped(event.target.value)}
          problem={refusal?.fields.name}
        />
        <Button onClick={save} isBusy={isPending} busyLabel="Keeping" disabled={!push}>
          Keep it
        </Button>
      </div>
      <ProblemNote explanation={refusal?.explanation ?? null} />
    </>
  );
}

function KeptScenarios({ scenarios }: { scenarios: KeptScenario[] }) {
  const { draft, change } = usePush();
  if (scenarios.length === 0) return null;
  return (
    <div>
      <h3>Scenarios kept</h3>
      <ul className={styles.saved}>
        {scenarios.map(({ id, name, pushes }) => {
          const [push] = pushes;
          const kept = push && pushes.length === 1 ? fromPush(push, draft) : null;
          return (
            <li key={id}>
              {kept ? (
                <Button kind="text" onClick={() => change(kept)}>
                  {name}
                </Button>
              ) : (
                name
              )}
            </li>
          );
        })}
      </ul>
    </div>
  );
}
