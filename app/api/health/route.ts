/** Whether the app answers and reaches its database: 200 or 503, for a load balancer and for the launcher. */
import { checkHealth } from '@/lib/services/check-health';

export const dynamic = 'force-dynamic';

export async function GET(): Promise<Response> {
  const health = await checkHealth();
  return Response.json(health, { status: health.ok ? 200 : 503, headers: { 'Cache-Control': 'no-store' } });
}
