/** A file with invented counts, to try the import with. */
import { writeSample } from '@/lib/series/template';

export function GET(): Response {
  return new Response(writeSample(), {
    headers: {
      'Content-Type': 'text/csv; charset=utf-8',
      'Content-Disposition': 'attachment; filename="elbowroom-sample.csv"',
    },
  });
}
