'use client';

/** Scenarios that are kept with the market: keep, bring back, rename, copy, remove; up to four side by side. */
import { useMemo, useState, useTransition } from 'react';
import { removeScenarioAction } from '@/app/_actions/remove-scenario';
import { saveScenarioAction } from '@/app/_actions/save-scenario';
import type { FormRefusal } from '@/app/_lib/form-refusal';
import type { Money } from '@/lib/scenario/money';
import type { PreparedScenario } from '@/lib/scenario/prepare-scenario';
import { MAX_SIDE_BY_SIDE } from '@/lib/scenario/push-bounds';
import type { PricedPush } from '@/lib/scenario/spend';
import { cutText } from '@/lib/series/clean-name';
import { MAX_NAME_LENGTH } from '@/lib/series/limits';
import { Button } from '../controls/button';
import { ConfirmButton } from '../controls/confirm-button';
import { type Explanation, ProblemNote } from '../controls/problem-note';
import { TextField } from '../controls/text-field';
import styles from './change.module.css';
import { useScenario } from './scenario-state';
import { SideBySideFigure } from './side-by-side-figure';

export interface KeptScenario {
  id: string;
  name: string;
  pushes: PricedPush[];
  money: Money | null;
  /** The fit it was last saved with. */
  fitId: string | null;
}

interface KeptScenariosProps {
  marketId: string;
  /** The fit whose draws are tried on. */
  fitId: string;
  scenarios: KeptScenario[];
  prepared: PreparedScenario | null;
  canWrite: boolean;
}

export function KeptScenarios({ marketId, fitId, scenarios, prepared, canWrite }: KeptScenariosProps) {
  const [chosen, setChosen] = useState<string[]>([]);
  if (!canWrite && scenarios.length === 0) return null;
  const toggle = (id: string) =>
    setChosen((known) => (known.includes(id) ? known.filter((one) => one !== id) : [...known, id]));
  const compared = scenarios.filter(({ id }) => chosen.includes(id));
  return (
    <section className={styles.save} aria-label="Scenarios kept">
      {canWrite ? <SaveForm marketId={marketId} /> : null}
      {scenarios.length > 0 ? (
        <>
          <h3 className={styles.figureName}>Scenarios kept</h3>
          <ul className={styles.saved}>
            {scenarios.map((scenario) => (
              <KeptScenarioLine
                key={scenario.id}
                marketId={marketId}
                scenario={scenario}
                isOfFit={scenario.fitId === null || scenario.fitId === fitId}
                canWrite={canWrite}
                isChosen={chosen.includes(scenario.id)}
                canChoose={compared.length < MAX_SIDE_BY_SIDE - 1}
                onChoose={() => toggle(scenario.id)}
              />
            ))}
          </ul>
        </>
      ) : null}
      {prepared && compared.length > 0 ? <Compared prepared={prepared} scenarios={compared} /> : null}
    </section>
  );
}

/** The chosen ones beside what is being tried. */
function Compared({ prepared, scenarios }: { prepared: PreparedScenario; scenarios: KeptScenario[] }) {
  const { facts, pushes, draft } = useScenario();
  const kept = useMemo(
    () =>
      scenarios.map(({ name, pushes: own, money }) => ({
        name,
        comparison: prepared.compare(own, money ?? undefined),
      })),
    [prepared, scenarios],
  );
  const tried = useMemo(
    () => ({ name: 'Tried above', comparison: prepared.compare(pushes, draft.money ?? undefined) }),
    [prepared, pushes, draft.money],
  );
  return <SideBySideFigure scenarios={[...kept, tried]} facts={facts} />;
}

function SaveForm({ marketId }: { marketId: string }) {
  const { pushes, draft, name: suggested } = useScenario();
  const [typed, setTyped] = useState<string | null>(null);
  const [refusal, setRefusal] = useState<FormRefusal | null>(null);
  const [isPending, startTransition] = useTransition();
  const save = () =>
    startTransition(async () => {
      const next = await saveScenarioAction(marketId, {
        name: typed ?? suggested,
        pushes,
        money: draft.money,
      });
      setRefusal(next);
      if (!next) setTyped(null);
    });
  return (
    <>
      <div className={styles.saveLine}>
        <TextField
          label="Keep this as a scenario"
          value={typed ?? suggested}
          onChange={(event) => setTyped(event.target.value)}
          problem={refusal?.fields.name}
        />
        <Button onClick={save} isBusy={isPending} busyLabel="Keeping" disabled={pushes.length === 0}>
          Keep it
        </Button>
      </div>
      <ProblemNote explanation={refusal?.explanation ?? null} />
    </>
  );
}

interface LineProps {
  marketId: string;
  scenario: KeptScenario;
  /** Kept or run again with the fit that is shown. */
  isOfFit: boolean;
  canWrite: boolean;
  isChosen: boolean;
  canChoose: boolean;
  onChoose: () => void;
}

function KeptScenarioLine({
  marketId,
  scenario,
  isOfFit,
  canWrite,
  isChosen,
  canChoose,
  onChoose,
}: LineProps) {
  const { id, name, pushes, money } = scenario;
  const { change } = useScenario();
  const [newName, setNewName] = useState<string | null>(null);
  const [explanation, setExplanation] = useState<Explanation | null>(null);
  const [isPending, startTransition] = useTransition();
  const run = (act: () => Promise<Explanation | null>) =>
    startTransition(async () => setExplanation(await act()));
  const save = (as: { scenarioId?: string; name: string }) => async () => {
    const refusal = await saveScenarioAction(marketId, { ...as, pushes, money });
    return (
      refusal &&
      (refusal.explanation ?? {
        what: 'It was not kept.',
        why: Object.values(refusal.fields)[0] ?? '',
        tryThis: 'Choose another name.',
      })
    );
  };
  return (
    <li className={styles.kept} aria-busy={isPending}>
      <label className={styles.check}>
        <input type="checkbox" checked={isChosen} disabled={!isChosen && !canChoose} onChange={onChoose} />
        <span className="visually-hidden">Compare </span>
        {newName === null ? name : ''}
      </label>
      {newName === null ? null : (
        <form
          className={styles.rename}
          onSubmit={(event) => {
            event.preventDefault();
            run(save({ scenarioId: id, name: newName }));
            setNewName(null);
          }}
        >
          <TextField
            label={`New name of ${name}`}
            value={newName}
            onChange={(event) => setNewName(event.target.value)}
          />
          <Button type="submit">Rename</Button>
        </form>
      )}
      <span className={styles.keptActions}>
        <Button
          kind="text"
          aria-label={`Bring back ${name}`}
          onClick={() => change(() => ({ pushes: [...pushes], open: 0, money }))}
        >
          Bring back
        </Button>
        {canWrite ? (
          <>
            <Button
              kind="text"
              aria-label={`Rename ${name}`}
              onClick={() => setNewName(newName === null ? name : null)}
            >
              Rename
            </Button>
            <Button
              kind="text"
              aria-label={`Copy ${name}`}
              onClick={() => run(save({ name: cutText(`Copy of ${name}`, MAX_NAME_LENGTH) }))}
            >
              Copy
            </Button>
            <ConfirmButton
              label={`Remove ${name}`}
              question={`Remove “${name}”?`}
              consequence="Forecasts that were issued with it keep it."
              confirmLabel="Remove it"
              onConfirm={() => run(() => removeScenarioAction(marketId, id))}
            >
              Remove
            </ConfirmButton>
          </>
        ) : null}
      </span>
      {isOfFit ? null : (
        <p className={styles.note}>
          Kept with an earlier fit; what it does is now counted on the newest one.{' '}
          {canWrite ? (
            <Button
              kind="text"
              aria-label={`Run it on this fit: ${name}`}
              onClick={() => run(save({ scenarioId: id, name }))}
            >
              Run it on this fit
            </Button>
          ) : null}
        </p>
      )}
      <ProblemNote explanation={explanation} />
    </li>
  );
}
