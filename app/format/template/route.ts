/** A table to fill in: the months of the last two years, the last whole one included. */
import { makeMonth } from '@/lib/series/month';
import { writeTemplate } from '@/lib/series/template';

export function GET(): Response {
  const now = new Date();
  const lastWhole = makeMonth(now.getUTCFullYear(), now.getUTCMonth() + 1) - 1;
  return new Response(writeTemplate(lastWhole), {
    headers: {
      'Content-Type': 'text/csv; charset=utf-8',
      'Content-Disposition': 'attachment; filename="elbowroom-template.csv"',
      'Cache-Control': 'no-store',
    },
  });
}
