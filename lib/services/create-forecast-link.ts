/** Makes a link that shows one issued forecast to whoever holds it. Its token is shown this once. */
import { hintOfToken } from '../issue/token';
import { createForecastLink as storeLink } from '../store/forecast-links';
import { type ForecastLinkForm, forecastLinkFormSchema } from './forms';
import { refuse, type Success, succeed } from './outcome';
import { type InvalidInput, type NotAllowed, type NotFound, parseWrite } from './parse-form';
import { createSecretToken } from './secret-token';
import type { Viewer } from './viewer';

export async function createForecastLink(
  viewer: Viewer,
  issuedId: string,
  form: ForecastLinkForm,
): Promise<Success<{ linkId: string; path: string }> | NotAllowed | InvalidInput | NotFound> {
  const parsed = parseWrite(viewer, forecastLinkFormSchema, form);
  if (!parsed.ok) return parsed;
  const { workspaceId, userId } = viewer;
  const { expiresAt } = parsed.value;
  const { token, tokenHash } = createSecretToken();
  const audit = {
    userId,
    action: 'create-forecast-link',
    detail: { expiresAt: expiresAt?.toISOString() ?? null },
  };
  const link = { tokenHash, hint: hintOfToken(token), expiresAt, createdById: userId };
  const stored = await storeLink({ workspaceId, issuedId, ...link, audit });
  return stored ? succeed({ linkId: stored.linkId, path: `/f/${token}` }) : refuse('not-found');
}
