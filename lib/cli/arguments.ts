/**
 * The words of the command line -> what to do. Nothing is run here.
 */
import { parseArgs } from 'node:util';
import Papa from 'papaparse';
import { DEFAULT_FIT_OPTIONS } from '../estimate/defaults';
import type { FitRequest } from './fit-request';
import {
  listScenarioOptions,
  readScenarioRequest,
  type ScenarioRequest,
  type ScenarioValues,
} from './scenario-arguments';

export type Command =
  | { kind: 'help' }
  | { kind: 'version' }
  | { kind: 'forecast'; request: FitRequest }
  | { kind: 'scenario'; request: ScenarioRequest }
  | { kind: 'not-understood'; reason: string };

/** Longest forecast: ten years. Beyond it the bands say nothing. */
export const MAX_HORIZON_MONTHS = 120;

/** Seeds are 32-bit. */
export const MAX_SEED = 2 ** 32 - 1;

const OPTIONS = {
  columns: { type: 'string' },
  sheet: { type: 'string' },
  firms: { type: 'string' },
  aggregate: { type: 'string' },
  'decimal-mark': { type: 'string' },
  'date-order': { type: 'string' },
  months: { type: 'string' },
  seed: { type: 'string' },
  push: { type: 'string', multiple: true },
  scenario: { type: 'string', multiple: true },
  money: { type: 'string' },
  keep: { type: 'string' },
  counter: { type: 'string' },
  json: { type: 'boolean' },
  help: { type: 'boolean', short: 'h' },
  version: { type: 'boolean' },
} as const;

export function readArguments(args: readonly string[]): Command {
  try {
    const { values, positionals } = parseArgs({ args: [...args], options: OPTIONS, allowPositionals: true });
    if (values.help || (positionals[0] === 'help' && positionals.length === 1)) return { kind: 'help' };
    if (values.version) return { kind: 'version' };
    return readCommand(values, positionals);
  } catch (error) {
    if (isArgumentError(error)) return { kind: 'not-understood', reason: firstSentence(error.message) };
    throw error;
  }
}

/** True when `--json` was asked for, even where the rest of the command is not understood. */
export function wantsJson(args: readonly string[]): boolean {
  const end = args.indexOf('--');
  return args.slice(0, end < 0 ? args.length : end).includes('--json');
}

type Values = FitValues & ScenarioValues;
type FitOption =
  | 'columns'
  | 'sheet'
  | 'firms'
  | 'aggregate'
  | 'decimal-mark'
  | 'date-order'
  | 'months'
  | 'seed';
type FitValues = Partial<Record<FitOption, string>>;

const COMMANDS = ['forecast', 'scenario'];

function readCommand(values: Values, [command, file, ...more]: string[]): Command {
  if (command === undefined) return notUnderstood('Say what to do: elbowroom forecast FILE.');
  if (!COMMANDS.includes(command)) {
    return notUnderstood(`There is no command “${command}”; there are “forecast” and “scenario”.`);
  }
  if (file === undefined) return notUnderstood(`Name a file: elbowroom ${command} FILE.`);
  if (more.length > 0) return notUnderstood(`One file at a time; “${more[0]}” is too much.`);
  const fit = readFitRequest(values, file);
  if (typeof fit === 'string') return notUnderstood(fit);
  if (command === 'forecast') {
    const [foreign] = listScenarioOptions(values);
    if (foreign) return notUnderstood(`${foreign} belongs to the command “scenario”.`);
    return { kind: 'forecast', request: fit };
  }
  const scenario = readScenarioRequest(values, fit);
  return typeof scenario === 'string' ? notUnderstood(scenario) : { kind: 'scenario', request: scenario };
}

/** A string is the reason why it is not understood. */
function readFitRequest(values: FitValues, file: string): FitRequest | string {
  const columns = values.columns === undefined ? null : splitColumns(values.columns);
  if (columns?.length !== 3 && columns !== null) {
    return '--columns takes three headers: month,focal,rival. Put one that holds a comma into double quotes.';
  }
  const firms = values.firms === undefined ? null : splitColumns(values.firms);
  if (firms?.length !== 2 && firms !== null)
    return '--firms takes two names: focal,rival. Put one that holds a comma into double quotes.';
  const aggregation = values.aggregate;
  if (!isOneOf(aggregation, ['mean', 'last'])) return '--aggregate takes mean or last.';
  const horizonMonths = readInteger(values.months, DEFAULT_FIT_OPTIONS.horizonMonths, 1, MAX_HORIZON_MONTHS);
  if (horizonMonths === null) return `--months takes a whole number from 1 to ${MAX_HORIZON_MONTHS}.`;
  const seed = readInteger(values.seed, DEFAULT_FIT_OPTIONS.seed, 0, MAX_SEED);
  if (seed === null) return `--seed takes a whole number from 0 to ${MAX_SEED}.`;
  const decimalMark = values['decimal-mark'];
  if (!isOneOf(decimalMark, ['point', 'comma'])) return '--decimal-mark takes point or comma.';
  const dateOrder = values['date-order'];
  if (!isOneOf(dateOrder, ['day-first', 'month-first']))
    return '--date-order takes day-first or month-first.';

  return {
    file,
    columns: columns as FitRequest['columns'],
    sheet: values.sheet ?? null,
    firms: firms as FitRequest['firms'],
    aggregation,
    decimalMark,
    dateOrder,
    horizonMonths,
    seed,
  };
}

function notUnderstood(reason: string): Command {
  return { kind: 'not-understood', reason };
}

/** Headers may hold commas inside quotes, as in the file itself. */
function splitColumns(text: string): string[] {
  const [cells = []] = Papa.parse<string[]>(text, { delimiter: ',' }).data;
  return cells.map((cell) => cell.trim());
}

function readInteger(
  text: string | undefined,
  otherwise: number,
  lowest: number,
  highest: number,
): number | null {
  if (text === undefined) return otherwise;
  const value = Number(text);
  return /^\d+$/.test(text) && value >= lowest && value <= highest ? value : null;
}

function isOneOf<T extends string>(text: string | undefined, words: readonly T[]): text is T | undefined {
  return text === undefined || (words as readonly string[]).includes(text);
}

function isArgumentError(error: unknown): error is Error {
  return error instanceof Error && 'code' in error && String(error.code).startsWith('ERR_PARSE_ARGS');
}

/** Node's messages go on with advice for programmers. */
function firstSentence(message: string): string {
  return `${message.split(/\.(?:\s|$)|\n/)[0]}.`;
}
