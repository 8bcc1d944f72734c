/** How far the analysis of what the data of a market can tell is, for the page that waits for it. */
import { readViewer } from '@/app/_lib/require-viewer';
import { readAnalysis } from '@/lib/services/read-analysis';

export async function GET(
  _request: Request,
  { params }: { params: Promise<{ id: string }> },
): Promise<Response> {
  const viewer = await readViewer();
  if (!viewer) return Response.json({ code: 'signed-out' }, { status: 401 });
  const { id } = await params;
  const outcome = await readAnalysis(viewer, id, 'identifiability');
  if (!outcome.ok) return Response.json({ code: outcome.code }, { status: 404 });
  const { state, progress } = outcome.value;
  const headers = { 'Cache-Control': 'private, no-store' };
  return Response.json({ state, progress }, { headers });
}
