/** An issued forecast, for the members of its workspace: what its links show. */
import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { FrozenBrief } from '@/app/_components/issue/frozen-brief';
import { requireViewer } from '@/app/_lib/require-viewer';
import { readIssued } from '@/lib/services/read-issued';

export const metadata: Metadata = { title: 'Issued forecast' };

export default async function IssuedPage({ params }: { params: Promise<{ id: string; issuedId: string }> }) {
  const { id, issuedId } = await params;
  const viewer = await requireViewer(`/markets/${id}/issued/${issuedId}`);
  const outcome = await readIssued(viewer, issuedId);
  if (!outcome.ok || outcome.value.marketId !== id) notFound();
  return <FrozenBrief forecast={outcome.value.content} viewer={viewer} />;
}
