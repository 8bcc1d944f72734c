'use client';

/** An owner makes a set-up link for an analyst or a reader; the link is shown this once. */
import { useActionState } from 'react';
import { createMemberLinkAction, type MemberLinkState } from '@/app/_actions/create-member-link';
import { Button } from '../controls/button';
import { ChoiceField } from '../controls/choice-field';
import { ProblemNote } from '../controls/problem-note';
import { SecretLink } from '../controls/secret-link';
import styles from './account-form.module.css';

const START: MemberLinkState = { link: null, explanation: null };

const ROLES = [
  { value: 'analyst', label: 'Analyst: imports, fits, issues' },
  { value: 'reader', label: 'Reader: looks' },
];

export function InviteForm() {
  const [state, act, isPending] = useActionState(createMemberLinkAction, START);
  return (
    <>
      <form action={act} className={styles.flushForm}>
        <ChoiceField label="Role" name="role" options={ROLES} />
        <ProblemNote explanation={state.explanation} />
        <Button type="submit" kind="main" isBusy={isPending} busyLabel="Making the link">
          Make a set-up link
        </Button>
      </form>
      {state.link ? (
        <SecretLink
          label={`Set-up link for ${state.link.role === 'analyst' ? 'an analyst' : 'a reader'}`}
          url={state.link.url}
          note={`It works once and until ${state.link.expires}. It is shown only now: copy it and hand it over yourself.`}
        />
      ) : null}
    </>
  );
}
