/** Posterior draws of a fit for the browser, which tries pushes on them: thinned evenly, as plain JSON. */
import { thinDraws } from '../estimate/draws';
import type { DrawSet } from '../estimate/types';
import { readDraws as readStoredDraws } from '../store/fits';
import { refuse, type Success, succeed } from './outcome';
import type { NotFound } from './parse-form';
import type { Viewer } from './viewer';

/** Draws that a page works on: a slider must answer within a frame or two, and 400 draws put a median within 2.5 points. */
const BROWSER_DRAWS = 400;
const MAX_DRAWS = 2000;

/** @param count how many draws at most, an integer from 1 to 2,000 */
export async function readDraws(
  viewer: Viewer,
  fitId: string,
  count: number = BROWSER_DRAWS,
): Promise<Success<DrawSet> | NotFound> {
  if (!(Number.isInteger(count) && count >= 1 && count <= MAX_DRAWS)) {
    throw new RangeError(`count must be an integer from 1 to ${MAX_DRAWS}, got ${count}`);
  }
  const draws = await readStoredDraws({ workspaceId: viewer.workspaceId, fitId });
  if (!draws) return refuse('not-found');
  const thinned = thinDraws(draws, count);
  return succeed({ ...thinned, values: Array.from(thinned.values) });
}
