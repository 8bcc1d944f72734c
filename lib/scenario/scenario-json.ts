/**
 * The written form of a scenario: a name, pushes by either firm, and what is assumed to count money. Files, links and the command
 * line carry it. A written version is never read differently: a new form gets a new version here.
 */
import { z } from 'zod';
import { moneySchema } from './money';
import { MAX_SCENARIO_NAME_LENGTH } from './push-bounds';
import { pushesSchema } from './push-schema';

export const SCENARIO_VERSION = 1;

export const scenarioJsonSchema = z.strictObject({
  version: z.literal(SCENARIO_VERSION),
  name: z.string().trim().min(1).max(MAX_SCENARIO_NAME_LENGTH),
  pushes: pushesSchema,
  money: moneySchema.optional(),
});
export type ScenarioJson = z.infer<typeof scenarioJsonSchema>;

export interface ScenarioProblem {
  /** "pushes.0.size"; empty for the whole. */
  place: string;
  message: string;
}

export type ScenarioReading =
  | { ok: true; value: ScenarioJson }
  /** No JSON at all. */
  | { ok: false; code: 'not-json' }
  /** Written by a later release. */
  | { ok: false; code: 'unknown-version'; version: number }
  | { ok: false; code: 'invalid'; problems: ScenarioProblem[] };

const versionedSchema = z.object({ version: z.number().int().positive() });

export function parseScenario(text: string): ScenarioReading {
  let json: unknown;
  try {
    json = JSON.parse(text);
  } catch {
    return { ok: false, code: 'not-json' };
  }
  return readScenario(json);
}

export function readScenario(json: unknown): ScenarioReading {
  const versioned = versionedSchema.safeParse(json);
  if (versioned.success && versioned.data.version > SCENARIO_VERSION) {
    return { ok: false, code: 'unknown-version', version: versioned.data.version };
  }
  const parsed = scenarioJsonSchema.safeParse(json);
  if (parsed.success) return { ok: true, value: parsed.data };
  const problems = parsed.error.issues.map(({ path, message }) => ({ place: path.join('.'), message }));
  return { ok: false, code: 'invalid', problems };
}

/** Indented, for a file that people open. */
export function writeScenario(scenario: Omit<ScenarioJson, 'version'>): string {
  return `${JSON.stringify({ version: SCENARIO_VERSION, ...scenario }, null, 2)}\n`;
}
