'use client';

import { useActionState } from 'react';
import { acceptSetupLinkAction, type SetupState } from '@/app/_actions/accept-setup-link';
import { MIN_PASSWORD_LENGTH } from '@/lib/services/form-limits';
import { Button } from '../controls/button';
import { ProblemNote } from '../controls/problem-note';
import { TextField } from '../controls/text-field';
import styles from './account-form.module.css';

const START: SetupState = { name: '', email: '', fields: {}, explanation: null };

/** The account that a set-up link allows: name, e-mail address, password. */
export function SetupForm({ token }: { token: string }) {
  const [state, act, isPending] = useActionState(acceptSetupLinkAction, START);
  return (
    <form action={act} className={styles.form} noValidate>
      <input type="hidden" name="token" value={token} />
      <TextField
        label="Your name"
        name="name"
        autoComplete="name"
        required
        defaultValue={state.name}
        problem={state.fields.name}
        help="Stands on the forecasts that you issue."
      />
      <TextField
        label="E-mail address"
        name="email"
        type="email"
        autoComplete="username"
        required
        defaultValue={state.email}
        problem={state.fields.email}
        help="You sign in with it. Nothing is sent to it."
      />
      <TextField
        label="Password"
        name="password"
        type="password"
        autoComplete="new-password"
        required
        minLength={MIN_PASSWORD_LENGTH}
        problem={state.fields.password}
        help={`At least ${MIN_PASSWORD_LENGTH} characters.`}
      />
      <ProblemNote explanation={state.explanation} />
      <Button type="submit" kind="main" isBusy={isPending} busyLabel="Making the account">
        Make the account
      </Button>
    </form>
  );
}
