/** Posterior draws on which the page tries pushes; fetched once for each fit. GET ?fit=<id> */
import { readViewer } from '@/app/_lib/require-viewer';
import { readDraws } from '@/lib/services/read-draws';

/** The draws of a fit never change, so a browser may keep them for the day; they are private to the member. */
const CACHE = 'private, max-age=86400, immutable';

export async function GET(request: Request): Promise<Response> {
  const viewer = await readViewer();
  if (!viewer) return Response.json({ code: 'signed-out' }, { status: 401 });
  const fitId = new URL(request.url).searchParams.get('fit') ?? '';
  const outcome = await readDraws(viewer, fitId);
  if (!outcome.ok) return Response.json({ code: outcome.code }, { status: 404 });
  return Response.json(outcome.value, { headers: { 'Cache-Control': CACHE } });
}
