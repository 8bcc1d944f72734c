/** The frozen content of an issued forecast, read by the reader of the version that it carries. */
import type { IssuedForecast } from '../issue/format';
import { readIssuedForecast } from '../issue/read';
import { StoreError } from './store-error';

/** @throws StoreError 'inconsistent-row' when it is damaged or was written by a later release. */
export function readIssuedContent(content: unknown, id: string): IssuedForecast {
  const reading = readIssuedForecast(content);
  if (reading.ok) return reading.value;
  throw new StoreError(
    'inconsistent-row',
    `issued_forecast.content of ${id} cannot be read: ${reading.code}`,
  );
}
