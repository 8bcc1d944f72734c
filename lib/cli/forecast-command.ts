/**
 * `elbowroom forecast FILE`: file -> series -> outlook -> text or JSON. Every way of ending is one of EXIT_CODES.
 */
import { buildBrief } from '../brief/build-brief';
import type { CommandEnd } from './command-end';
import { fitFile, toFacts } from './fit-file';
import type { FitRequest } from './fit-request';
import { toForecastJson } from './forecast-json';
import { renderOutlook } from './forecast-text';
import type { Terminal } from './terminal';

export async function forecast(
  request: FitRequest,
  asJson: boolean,
  terminal: Terminal,
): Promise<CommandEnd> {
  const startedAt = performance.now();
  const fitted = await fitFile(request, terminal);
  if ('exit' in fitted) return fitted;
  const { reading, report } = fitted;
  const milliseconds = performance.now() - startedAt;
  const output = asJson
    ? `${JSON.stringify(toForecastJson(reading, report, milliseconds))}\n`
    : renderOutlook(buildBrief(toFacts(fitted)), reading.series, reading.problems);
  return { exit: 'ok', output };
}
