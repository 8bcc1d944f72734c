/**
 * Opens an issued forecast for a visitor without an account. The one gate: nothing else serves what a link shows.
 * Wrong, expired and revoked look alike, in the answer and in the work done for it.
 */
import type { IssuedForecast } from '../issue/format';
import { isTokenShaped } from '../issue/token';
import { openForecastLink as openStoredLink } from '../store/forecast-links';
import { readClientAddress } from './client-address';
import { countTries, hasTriesLeft, type Try } from './count-tries';
import { type Outcome, refuse, succeed } from './outcome';
import { hashToken } from './secret-token';

export async function openForecastLink(
  token: string,
  headers: Headers,
): Promise<Outcome<IssuedForecast, 'not-available' | 'too-many-tries'>> {
  if (!isTokenShaped(token)) return refuse('not-available');
  const guess: Try = { kind: 'forecastLink', subject: readClientAddress(headers) };
  if (!(await hasTriesLeft(guess))) return refuse('too-many-tries');
  const forecast = await openStoredLink({ tokenHash: hashToken(token), now: new Date() });
  if (forecast) return succeed(forecast);
  await countTries([guess]);
  return refuse('not-available');
}
