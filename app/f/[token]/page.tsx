/**
 * A forecast link: the issued forecast as it was frozen, for whoever holds the link. Works signed out; nothing else of the
 * workspace is read. Headers that keep the address out of caches, referrers and search engines are set in next.config.js.
 */
import type { Metadata } from 'next';
import { headers } from 'next/headers';
import { notFound } from 'next/navigation';
import { FrozenBrief } from '@/app/_components/issue/frozen-brief';
import { Notice } from '@/app/_components/text/notice';
import { explainCode } from '@/lib/services/explain';
import { openForecastLink } from '@/lib/services/open-forecast-link';

/** The same for every token, so that a preview of the address tells nothing. */
export const metadata: Metadata = {
  title: 'Issued forecast',
  description: 'An issued forecast.',
  referrer: 'no-referrer',
  robots: { index: false, follow: false, noarchive: true },
};

export default async function ForecastLinkPage({ params }: { params: Promise<{ token: string }> }) {
  const { token } = await params;
  const outcome = await openForecastLink(token, await headers());
  if (outcome.ok) return <FrozenBrief forecast={outcome.value} viewer={null} />;
  if (outcome.code === 'too-many-tries') return <Notice explanation={explainCode(outcome.code)} />;
  notFound();
}
