'use client';

/** The links of one issued forecast: how long each opens, how often it was opened; make one, withdraw one. */
import { useState, useTransition } from 'react';
import { createForecastLinkAction, type ForecastLinkState } from '@/app/_actions/create-forecast-link';
import { revokeForecastLinkAction } from '@/app/_actions/revoke-forecast-link';
import { DEFAULT_LINK_DAYS, LINK_DAYS } from '@/app/_forms/forecast-link-days';
import { formatDay } from '@/app/_lib/locale';
import type { IssuedSummary } from '@/lib/services/read-market';
import { Button } from '../controls/button';
import { ChoiceField } from '../controls/choice-field';
import { ConfirmButton } from '../controls/confirm-button';
import { type Explanation, ProblemNote } from '../controls/problem-note';
import { SecretLink } from '../controls/secret-link';
import styles from './issue.module.css';

const NO_EXPIRY = 'none';
const EXPIRIES = [
  ...LINK_DAYS.map((days) => ({ value: String(days), label: days === 365 ? 'one year' : `${days} days` })),
  { value: NO_EXPIRY, label: 'until withdrawn' },
];

type ForecastLink = IssuedSummary['links'][number];

interface ForecastLinksProps {
  marketId: string;
  issuedId: string;
  links: ForecastLink[];
  canWrite: boolean;
}

export function ForecastLinks({ marketId, issuedId, links, canWrite }: ForecastLinksProps) {
  const [problem, setProblem] = useState<Explanation | null>(null);
  const [, startTransition] = useTransition();
  const revoke = (linkId: string) =>
    startTransition(async () => setProblem(await revokeForecastLinkAction(marketId, linkId)));
  return (
    <div>
      {links.length > 0 ? (
        <ul className={styles.links}>
          {links.map((link) => (
            <li key={link.id}>
              <LinkLine link={link} />
              {canWrite && !hasEnded(link) ? (
                <ConfirmButton
                  label={`Revoke the link ${link.hint}…`}
                  question="Withdraw this link?"
                  consequence="Whoever opens it from now on sees that it is not available. It cannot be brought back."
                  confirmLabel="Withdraw it"
                  onConfirm={() => revoke(link.id)}
                >
                  Revoke
                </ConfirmButton>
              ) : null}
            </li>
          ))}
        </ul>
      ) : null}
      <ProblemNote explanation={problem} />
      {canWrite ? <LinkMaker marketId={marketId} issuedId={issuedId} /> : null}
    </div>
  );
}

function hasEnded({ revokedAt, expiresAt }: ForecastLink): boolean {
  return revokedAt !== null || (expiresAt !== null && expiresAt.getTime() <= Date.now());
}

function LinkLine({ link }: { link: ForecastLink }) {
  const opened =
    link.openedCount === 0
      ? 'not opened yet'
      : `opened ${link.openedCount} ${link.openedCount === 1 ? 'time' : 'times'}`;
  return (
    <span className={styles.link}>
      <code className={styles.hint}>/f/{link.hint}…</code> {wordLife(link)}, {opened}
    </span>
  );
}

function wordLife(link: ForecastLink): string {
  if (link.revokedAt) return `withdrawn ${formatDay(link.revokedAt)}`;
  if (!link.expiresAt) return 'opens until it is withdrawn';
  return `${hasEnded(link) ? 'expired' : 'opens until'} ${formatDay(link.expiresAt)}`;
}

function LinkMaker({ marketId, issuedId }: { marketId: string; issuedId: string }) {
  const [expiry, setExpiry] = useState(String(DEFAULT_LINK_DAYS));
  const [state, setState] = useState<ForecastLinkState>({ url: null, explanation: null });
  const [isPending, startTransition] = useTransition();
  const make = () =>
    startTransition(async () => {
      const days = expiry === NO_EXPIRY ? null : Number(expiry);
      setState(await createForecastLinkAction(marketId, issuedId, days));
    });
  return (
    <>
      <div className={styles.maker}>
        <ChoiceField
          label="A link opens for"
          options={EXPIRIES}
          value={expiry}
          onChange={(event) => setExpiry(event.target.value)}
        />
        <Button onClick={make} isBusy={isPending} busyLabel="Making the link">
          Make a link
        </Button>
      </div>
      <ProblemNote explanation={state.explanation} />
      {state.url ? (
        <SecretLink
          label="Forecast link"
          url={state.url}
          note="Whoever has it sees this forecast without an account. It is shown only now: copy it."
        />
      ) : null}
    </>
  );
}
