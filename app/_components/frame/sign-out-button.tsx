/** Ends the session. A form, so that it works before scripts load. */
import { signOutAction } from '@/app/_actions/sign-out';
import { Button } from '../controls/button';

export function SignOutButton() {
  return (
    <form action={signOutAction}>
      <Button type="submit" kind="text">
        Sign out
      </Button>
    </form>
  );
}
