/** `npm run seed`: stores the demo markets that are not there yet in the database of DATABASE_URL. */
import { closePrisma } from '../lib/store/client';
import { seedDemo } from './seed';

const { created } = await seedDemo();
console.log(
  created.length === 0 ? 'The demo markets are there already.' : `Stored ${created.length} demo markets.`,
);
await closePrisma();
