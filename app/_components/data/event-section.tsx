'use client';

/** The dated events of a market: what is on the chart as a letter, and adding, changing and removing them. */
import { useState, useTransition } from 'react';
import { removeEventAction } from '@/app/_actions/remove-event';
import { LOCALE } from '@/app/_lib/locale';
import { createMonthFormat } from '@/lib/brief/month-words';
import type { MarketEvent } from '@/lib/services/read-market';
import { Button } from '../controls/button';
import { ConfirmButton } from '../controls/confirm-button';
import { type Explanation, ProblemNote } from '../controls/problem-note';
import { EventForm } from './event-form';
import styles from './event-section.module.css';

const months = createMonthFormat(LOCALE);

interface EventSectionProps {
  marketId: string;
  events: MarketEvent[];
  canWrite: boolean;
}

export function EventSection({ marketId, events, canWrite }: EventSectionProps) {
  /** Id of the event that is being changed; "new" for the one that is being added. */
  const [openId, setOpenId] = useState<string | null>(null);
  const close = () => setOpenId(null);
  return (
    <>
      {events.length === 0 ? <p className={styles.none}>No event is noted yet.</p> : null}
      <ol className={styles.list}>
        {events.map((event) => (
          <li key={event.id}>
            {openId === event.id ? (
              <EventForm marketId={marketId} event={event} onClose={close} />
            ) : (
              <EventLine
                marketId={marketId}
                event={event}
                canWrite={canWrite}
                onEdit={() => setOpenId(event.id)}
              />
            )}
          </li>
        ))}
      </ol>
      {openId === 'new' ? <EventForm marketId={marketId} event={null} onClose={close} /> : null}
      {canWrite && openId === null ? (
        <div className={styles.add}>
          <Button onClick={() => setOpenId('new')}>Note an event</Button>
        </div>
      ) : null}
    </>
  );
}

interface EventLineProps {
  marketId: string;
  event: MarketEvent;
  canWrite: boolean;
  onEdit: () => void;
}

function EventLine({ marketId, event, canWrite, onEdit }: EventLineProps) {
  const [explanation, setExplanation] = useState<Explanation | null>(null);
  const [, startTransition] = useTransition();
  const name = `${event.note}, ${months.long(event.month)}`;
  const remove = () =>
    startTransition(async () => setExplanation(await removeEventAction(marketId, event.id)));
  return (
    <>
      <div className={styles.line}>
        <span className={styles.month}>{months.long(event.month)}</span>
        <span className={styles.note}>
          {event.note}
          {event.changesParameters ? (
            <span className={styles.change}> · strengths may have changed</span>
          ) : null}
        </span>
        {canWrite ? (
          <span className={styles.acts}>
            <Button kind="text" aria-label={`Change the event: ${name}`} onClick={onEdit}>
              Change
            </Button>
            <ConfirmButton
              label={`Remove the event: ${name}`}
              question="Remove this event?"
              consequence={`“${event.note}” goes from the charts. Forecasts that were issued keep it.`}
              confirmLabel="Remove it"
              onConfirm={remove}
            >
              Remove
            </ConfirmButton>
          </span>
        ) : null}
      </div>
      <ProblemNote explanation={explanation} />
    </>
  );
}
