'use client';

/** The pushes of the scenario, one of them under the controls; more of them, copies, ready-made ones; undoing. */
import { describeStartingPoint } from '@/lib/brief/push-kind-words';
import { firstPush } from '@/lib/scenario/push-limits';
import { buildStartingPoint, STARTING_POINTS, type StartingPointId } from '@/lib/scenario/starting-points';
import { Button } from '../controls/button';
import { ChoiceField } from '../controls/choice-field';
import styles from './change.module.css';
import { addPush, canAdd, namePush, removeOpen } from './scenario-draft';
import { useScenario } from './scenario-state';

export function PushTabs() {
  const { words, draft, change, scale } = useScenario();
  const other = draft.pushes[draft.open]?.firm === 2 ? 1 : 2;
  return (
    <div className={styles.tabs}>
      {draft.pushes.length > 1 ? (
        <fieldset className={styles.pushList}>
          <legend className={styles.legend}>Pushes of this scenario</legend>
          {draft.pushes.map((push, index) => (
            // Pushes have no name of their own and may be alike: their place tells them apart.
            // biome-ignore lint/suspicious/noArrayIndexKey: see above
            <label key={index} className={styles.pushChoice} data-firm={push.firm === 1 ? 'focal' : 'rival'}>
              <input
                type="radio"
                name="open-push"
                checked={index === draft.open}
                onChange={() => change((known) => ({ ...known, open: index }), 'open')}
              />
              <span>{namePush(words, push)}</span>
            </label>
          ))}
        </fieldset>
      ) : null}
      <div className={styles.tabActions}>
        <Button
          kind="text"
          disabled={!canAdd(draft)}
          onClick={() => change((known) => addPush(known, firstPush(other, 'recruits', scale)))}
        >
          {draft.pushes.length === 0 ? 'Add a push' : 'Add another push'}
        </Button>
        {draft.pushes.length > 0 ? (
          <>
            <Button
              kind="text"
              disabled={!canAdd(draft)}
              onClick={() => change((known) => addPush(known, { ...known.pushes[known.open]! }))}
            >
              Copy this one
            </Button>
            <Button kind="text" onClick={() => change(removeOpen)}>
              Remove it
            </Button>
          </>
        ) : null}
        <UndoButtons />
      </div>
    </div>
  );
}

function UndoButtons() {
  const { undo, redo } = useScenario();
  return (
    <>
      <Button kind="text" disabled={!undo} onClick={() => undo?.()}>
        Undo
      </Button>
      <Button kind="text" disabled={!redo} onClick={() => redo?.()}>
        Redo
      </Button>
    </>
  );
}

/** Sets the open push to one of the ready-made ones, for the firm that pushes. */
export function StartingPointChoice() {
  const { draft, change, scale } = useScenario();
  const firm = draft.pushes[draft.open]?.firm ?? 2;
  const options = STARTING_POINTS.map((id) => ({
    value: id,
    label: describeStartingPoint(buildStartingPoint(id, firm, scale)).name,
  }));
  return (
    <ChoiceField
      label="Begin from"
      value=""
      options={[{ value: '', label: 'the values below' }, ...options]}
      onChange={(event) => {
        const id = event.target.value as StartingPointId | '';
        if (id === '') return;
        const { push } = buildStartingPoint(id, firm, scale);
        change((known) => ({
          ...known,
          pushes: known.pushes.map((one, index) => (index === known.open ? push : one)),
        }));
      }}
    />
  );
}
