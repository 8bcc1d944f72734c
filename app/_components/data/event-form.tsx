'use client';

/** One event: its month, a line on what happened, and whether the firms may behave otherwise from then on. */
import { type FormEvent, useId, useState, useTransition } from 'react';
import { saveEventAction } from '@/app/_actions/save-event';
import type { FormRefusal } from '@/app/_lib/form-refusal';
import { formatMonth, parseMonth } from '@/lib/series/month';
import { MAX_EVENT_LENGTH } from '@/lib/services/form-limits';
import type { MarketEvent } from '@/lib/services/read-market';
import { Button } from '../controls/button';
import { ProblemNote } from '../controls/problem-note';
import { TextField } from '../controls/text-field';
import styles from './event-section.module.css';

interface EventFormProps {
  marketId: string;
  /** null: a new one. */
  event: MarketEvent | null;
  onClose: () => void;
}

export function EventForm({ marketId, event, onClose }: EventFormProps) {
  const changeId = useId();
  const [monthText, setMonthText] = useState(event ? formatMonth(event.month) : '');
  const [note, setNote] = useState(event?.note ?? '');
  const [changesParameters, setChangesParameters] = useState(event?.changesParameters ?? false);
  const [monthProblem, setMonthProblem] = useState<string | null>(null);
  const [refusal, setRefusal] = useState<FormRefusal | null>(null);
  const [isPending, startTransition] = useTransition();

  function save(submit: FormEvent) {
    submit.preventDefault();
    const month = parseMonth(monthText);
    setMonthProblem(month === null ? 'Write the month as 2024-03 or March 2024.' : null);
    if (month === null) return;
    startTransition(async () => {
      const answer = await saveEventAction(marketId, event?.id ?? null, { month, note, changesParameters });
      setRefusal(answer);
      if (answer === null) onClose();
    });
  }

  return (
    <form className={styles.form} onSubmit={save}>
      <div className={styles.fields}>
        <TextField
          label="Month"
          value={monthText}
          onChange={(change) => setMonthText(change.target.value)}
          problem={monthProblem ?? refusal?.fields.month}
          placeholder="2024-03"
          autoFocus
        />
        <TextField
          label="What happened"
          value={note}
          maxLength={MAX_EVENT_LENGTH}
          onChange={(change) => setNote(change.target.value)}
          problem={refusal?.fields.note}
          placeholder="The rival cut its price"
        />
      </div>
      <label htmlFor={changeId} className={styles.check}>
        <input
          id={changeId}
          type="checkbox"
          checked={changesParameters}
          onChange={(change) => setChangesParameters(change.target.checked)}
        />
        The firms’ strengths may have changed from then on
      </label>
      <ProblemNote explanation={refusal?.explanation ?? null} />
      <div className={styles.buttons}>
        <Button kind="main" type="submit" isBusy={isPending} busyLabel="Saving the event">
          Save the event
        </Button>
        <Button onClick={onClose}>Leave it</Button>
      </div>
    </form>
  );
}
