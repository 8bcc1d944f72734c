/** Whether the app reaches its database. Says nothing about why not: the log does. */
import { getPrisma } from '../store/client';

export interface Health {
  ok: boolean;
  database: 'reached' | 'not-reached';
}

export async function checkHealth(): Promise<Health> {
  try {
    await getPrisma().$queryRaw`SELECT 1`;
    return { ok: true, database: 'reached' };
  } catch {
    return { ok: false, database: 'not-reached' };
  }
}
