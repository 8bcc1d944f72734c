/** An address that leads nowhere, or to something of another workspace: both look alike. */
import type { Metadata } from 'next';
import Link from 'next/link';
import { explainCode } from '@/lib/services/explain';
import { Notice } from './_components/text/notice';

export const metadata: Metadata = { title: 'Not here' };

export default function NotFound() {
  return (
    <Notice explanation={explainCode('not-found')}>
      <p>
        <Link href="/">The list of markets</Link>
      </p>
    </Notice>
  );
}
