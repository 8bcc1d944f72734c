/** A revision as a CSV file, which the import reads back to the same counts. GET ?revision=<number>; the newest without it. */
import { readViewer } from '@/app/_lib/require-viewer';
import { toCsv } from '@/lib/series/export-series';
import { readRevisionFile } from '@/lib/services/read-revision-file';

export async function GET(
  request: Request,
  { params }: { params: Promise<{ id: string }> },
): Promise<Response> {
  const viewer = await readViewer();
  if (!viewer) return new Response('Sign in first.', { status: 401 });
  const number = new URL(request.url).searchParams.get('revision');
  const outcome = await readRevisionFile(viewer, (await params).id, number === null ? null : Number(number));
  if (!outcome.ok) return new Response('There is no such market in your workspace.', { status: 404 });
  const { market, revision } = outcome.value;
  const { series, exclusions } = revision;
  const text = toCsv({ series, exclusions, focalName: market.focalName, rivalName: market.rivalName });
  return new Response(text, {
    headers: {
      'Content-Type': 'text/csv; charset=utf-8',
      'Content-Disposition': `attachment; filename="${fileNameOf(market.name, revision.number)}"`,
      'Cache-Control': 'private, no-store',
    },
  });
}

/** Letters, digits and hyphens only: safe in a header and on every file system. */
function fileNameOf(name: string, revision: number): string {
  const plain = name
    .normalize('NFD')
    .replace(/[^A-Za-z0-9]+/g, '-')
    .replace(/^-+|-+$/g, '')
    .toLowerCase();
  return `${plain || 'market'}-revision-${revision}.csv`;
}
