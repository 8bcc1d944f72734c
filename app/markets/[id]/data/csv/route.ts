/** The newest revision as a CSV file, which the import reads back to the same counts. */
import { readViewer } from '@/app/_lib/require-viewer';
import { toCsv } from '@/lib/series/export-series';
import { readMarket } from '@/lib/services/read-market';

export async function GET(
  _request: Request,
  { params }: { params: Promise<{ id: string }> },
): Promise<Response> {
  const viewer = await readViewer();
  if (!viewer) return new Response('Sign in first.', { status: 401 });
  const outcome = await readMarket(viewer, (await params).id);
  if (!outcome.ok) return new Response('There is no such market in your workspace.', { status: 404 });
  const { market, revision, series } = outcome.value;
  const text = toCsv({ series, focalName: market.focalName, rivalName: market.rivalName });
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
