/** Sign in with e-mail address and password. */
import type { Metadata } from 'next';
import { redirect } from 'next/navigation';
import { SignInForm } from '../_components/account/sign-in-form';
import { PageFrame } from '../_components/frame/page-frame';
import { Question } from '../_components/frame/question';
import { Headline } from '../_components/text/headline';
import { readViewer } from '../_lib/require-viewer';
import { readSafePath } from '../_lib/safe-path';

export const metadata: Metadata = { title: 'Sign in' };

export default async function SignInPage({
  searchParams,
}: {
  searchParams: Promise<{ next?: string | string[] }>;
}) {
  const next = readSafePath((await searchParams).next);
  if (await readViewer()) redirect(next);
  return (
    <PageFrame viewer={null}>
      <Question
        id="who"
        question="Who is reading?"
        note={<p>Accounts are made with a set-up link from an owner of the workspace.</p>}
        isFirst
      >
        <Headline
          support={<p>Where a two-firm market is heading, how sure that is, and what would change it.</p>}
        >
          Sign in to your markets.
        </Headline>
        <SignInForm next={next} />
      </Question>
    </PageFrame>
  );
}
