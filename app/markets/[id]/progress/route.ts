/** How far a fit is, for the page that waits for it. GET ?fit=<id> */
import { readViewer } from '@/app/_lib/require-viewer';
import { readFitProgress } from '@/lib/services/read-fit-progress';

export async function GET(request: Request): Promise<Response> {
  const viewer = await readViewer();
  if (!viewer) return Response.json({ code: 'signed-out' }, { status: 401 });
  const fitId = new URL(request.url).searchParams.get('fit') ?? '';
  const outcome = await readFitProgress(viewer, fitId);
  if (!outcome.ok) return Response.json({ code: outcome.code }, { status: 404 });
  return Response.json(outcome.value, { headers: { 'Cache-Control': 'private, no-store' } });
}
