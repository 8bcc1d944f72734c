'use client';

import { useActionState } from 'react';
import { type SignInState, signInAction } from '@/app/_actions/sign-in';
import { Button } from '../controls/button';
import { ProblemNote } from '../controls/problem-note';
import { TextField } from '../controls/text-field';
import styles from './account-form.module.css';

const START: SignInState = { email: '', fields: {}, explanation: null };

/** @param next path to open after signing in. */
export function SignInForm({ next }: { next: string }) {
  const [state, act, isPending] = useActionState(signInAction, START);
  return (
    <form action={act} className={styles.form} noValidate>
      <input type="hidden" name="next" value={next} />
      <TextField
        label="E-mail address"
        name="email"
        type="email"
        autoComplete="username"
        required
        defaultValue={state.email}
        problem={state.fields.email}
      />
      <TextField
        label="Password"
        name="password"
        type="password"
        autoComplete="current-password"
        required
        problem={state.fields.password}
      />
      <ProblemNote explanation={state.explanation} />
      <Button type="submit" kind="main" isBusy={isPending} busyLabel="Signing in">
        Sign in
      </Button>
    </form>
  );
}
