/**
 * Stores the demo markets in the database of DATABASE_URL:  npm run seed
 * Exit codes: 0 done or already there, 1 not done, 2 no usable DATABASE_URL.
 */
import { closePrisma, getDatabaseUrl } from '../lib/store/client';
import { StoreError } from '../lib/store/store-error';
import { seedDemo } from './seed';

async function main(): Promise<number> {
  try {
    getDatabaseUrl();
    const { created } = await seedDemo();
    const count = created.length === 1 ? '1 demo market' : `${created.length} demo markets`;
    console.log(created.length === 0 ? 'The demo markets are all there.' : `Stored ${count}.`);
    return 0;
  } catch (error) {
    console.error(`The demo markets could not be stored: ${lastLine(error)}.`);
    return error instanceof StoreError && error.code.endsWith('database-url') ? 2 : 1;
  } finally {
    await closePrisma();
  }
}

/** Prisma's messages begin with the call and end with the cause. */
function lastLine(error: unknown): string {
  const text = error instanceof Error ? error.message : String(error);
  return text.trim().split('\n').at(-1)!.replace(/\.$/, '');
}

process.exitCode = await main();
