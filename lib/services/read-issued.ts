/** An issued forecast with its links, for the members of its workspace. */
import type { IssuedForecast } from '../issue/format';
import { type ForecastLink, listForecastLinks } from '../store/forecast-links';
import { readIssuedForecast } from '../store/issued-forecasts';
import { refuse, type Success, succeed } from './outcome';
import type { NotFound } from './parse-form';
import type { Viewer } from './viewer';

export interface IssuedPage {
  id: string;
  marketId: string;
  content: IssuedForecast;
  links: ForecastLink[];
}

export async function readIssued(viewer: Viewer, issuedId: string): Promise<Success<IssuedPage> | NotFound> {
  const scope = { workspaceId: viewer.workspaceId, issuedId };
  const stored = await readIssuedForecast(scope);
  if (!stored) return refuse('not-found');
  const { id, marketId, content } = stored;
  return succeed({ id, marketId, content, links: await listForecastLinks(scope) });
}
