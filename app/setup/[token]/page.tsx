/** The one-time set-up link: whoever holds it makes an account, once. Used, expired and mistyped links look alike. */
import type { Metadata } from 'next';
import { headers } from 'next/headers';
import Link from 'next/link';
import { SetupForm } from '@/app/_components/account/setup-form';
import { PageFrame } from '@/app/_components/frame/page-frame';
import { Question } from '@/app/_components/frame/question';
import { Headline } from '@/app/_components/text/headline';
import { Notice } from '@/app/_components/text/notice';
import { checkSetupLink } from '@/lib/services/accept-setup-link';
import { explainCode } from '@/lib/services/explain';

export const metadata: Metadata = { title: 'Set up', referrer: 'no-referrer' };

const ROLE_WORDS = { owner: 'an owner', analyst: 'an analyst', reader: 'a reader' } as const;

export default async function SetupPage({ params }: { params: Promise<{ token: string }> }) {
  const { token } = await params;
  const link = await checkSetupLink(token, await headers());
  if (!link.ok) {
    return (
      <Notice explanation={explainCode(link.code)}>
        <p>
          If your account is made already, <Link href="/sign-in">sign in</Link>.
        </p>
      </Notice>
    );
  }
  return (
    <PageFrame title={link.value.workspaceName} viewer={null}>
      <Question
        id="who"
        question="Who are you?"
        note={<p>This link works once. Keep it to yourself until then.</p>}
        isFirst
      >
        <Headline
          support={
            <p>
              You join {link.value.workspaceName} as {ROLE_WORDS[link.value.role]}.
            </p>
          }
        >
          Make your account.
        </Headline>
        <SetupForm token={token} />
      </Question>
    </PageFrame>
  );
}
