/** One revision with its market, for a download. */
import { type Market, readMarket } from '../store/markets';
import { latestRevision, type Revision, readRevisionByNumber } from '../store/revisions';
import { refuse, type Success, succeed } from './outcome';
import type { NotFound } from './parse-form';
import type { Viewer } from './viewer';

/** @param number null: the newest revision */
export async function readRevisionFile(
  { workspaceId }: Viewer,
  marketId: string,
  number: number | null,
): Promise<Success<{ market: Market; revision: Revision }> | NotFound> {
  const scope = { workspaceId, marketId };
  const isNumber = number === null || (Number.isInteger(number) && number > 0 && number < 2 ** 31);
  if (!isNumber) return refuse('not-found');
  const [market, revision] = await Promise.all([
    readMarket(scope),
    number === null ? latestRevision(scope) : readRevisionByNumber({ ...scope, number }),
  ]);
  return market && revision ? succeed({ market, revision }) : refuse('not-found');
}
