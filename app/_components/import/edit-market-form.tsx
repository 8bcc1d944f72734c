'use client';

/** Changes a market's names, unit, measurement errors and addressable market. Other errors make the outlook stale; names change no number. */
import { useState, useTransition } from 'react';
import { editMarketAction } from '@/app/_actions/edit-market';
import type { FieldSentences } from '@/app/_lib/explain-field';
import type { MarketEdit } from '@/lib/services/forms';
import { Button } from '../controls/button';
import { type Explanation, ProblemNote } from '../controls/problem-note';
import styles from './flow.module.css';
import { type MarketDetails, MarketFields, readDetails } from './market-fields';

interface EditMarketFormProps {
  marketId: string;
  market: Required<MarketEdit>;
}

export function EditMarketForm({ marketId, market }: EditMarketFormProps) {
  const [details, setDetails] = useState<MarketDetails>({
    ...market,
    focalError: String(market.focalError),
    rivalError: String(market.rivalError),
    focalAddressable: spellUsers(market.focalAddressable),
    rivalAddressable: spellUsers(market.rivalAddressable),
    addressableError: String(market.addressableError),
  });
  const [fields, setFields] = useState<FieldSentences>({});
  const [explanation, setExplanation] = useState<Explanation | null>(null);
  const [isPending, startTransition] = useTransition();

  const save = () =>
    startTransition(async () => {
      const refusal = await editMarketAction(marketId, {
        ...readDetails(details),
        focalName: details.focalName ?? market.focalName,
        rivalName: details.rivalName ?? market.rivalName,
      });
      setFields(refusal.fields);
      setExplanation(refusal.explanation);
    });

  return (
    <>
      <MarketFields
        details={details}
        columnNames={{ focal: market.focalName, rival: market.rivalName }}
        problems={fields}
        onChange={setDetails}
      />
      <div className={styles.end}>
        <ProblemNote explanation={explanation} />
        <Button onClick={save} isBusy={isPending} busyLabel="Changing">
          Change the market
        </Button>
      </div>
    </>
  );
}

function spellUsers(users: number | null): string {
  return users === null ? '' : String(users);
}
