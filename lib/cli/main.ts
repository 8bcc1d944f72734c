/**
 * The command line: arguments in, exit code out. Results go to standard output, everything else to standard error.
 */
import packageJson from '../../package.json';
import { readArguments, wantsJson } from './arguments';
import type { CommandEnd } from './command-end';
import { type ExitId, exitCodeOf } from './exit-codes';
import { forecast } from './forecast-command';
import { toErrorJson } from './forecast-json';
import { renderProblems } from './forecast-text';
import { helpText, USAGE } from './help';
import { scenario } from './scenario-command';
import { openTerminal, type Terminal } from './terminal';

export async function main(args: readonly string[]): Promise<number> {
  const terminal = openTerminal(process.stderr);
  const asJson = wantsJson(args);
  try {
    return await write(await run(args, asJson, terminal), asJson, terminal);
  } catch (error) {
    terminal.clearProgress();
    const detail = error instanceof Error ? `${error.name}: ${error.message.split('\n')[0]}` : String(error);
    const message = `This is a fault of the program (${detail}). Please report it with the file.`;
    return write({ exit: 'internal', message, problems: [] }, asJson, terminal);
  }
}

async function run(args: readonly string[], asJson: boolean, terminal: Terminal): Promise<CommandEnd> {
  const command = readArguments(args);
  switch (command.kind) {
    case 'help':
      return { exit: 'ok', output: helpText() };
    case 'version':
      return { exit: 'ok', output: `${packageJson.version}\n` };
    case 'not-understood':
      return { exit: 'usage', message: `${command.reason} Usage: ${USAGE}`, problems: [] };
    case 'forecast':
      return forecast(command.request, asJson, terminal);
    case 'scenario':
      return scenario(command.request, asJson, terminal);
  }
}

async function write(end: CommandEnd, asJson: boolean, terminal: Terminal): Promise<number> {
  if (end.exit === 'ok') await print(end.output);
  else await writeError(end.exit, end.message, end.problems, asJson, terminal);
  return exitCodeOf(end.exit);
}

async function writeError(
  exit: ExitId,
  message: string,
  problems: Extract<CommandEnd, { message: string }>['problems'],
  asJson: boolean,
  terminal: Terminal,
): Promise<void> {
  if (asJson) {
    await print(`${JSON.stringify(toErrorJson(exit, message, problems))}\n`);
    return;
  }
  terminal.warn(message);
  if (problems.length > 1) process.stderr.write(`${renderProblems(problems)}\n`);
}

/** Resolves when the text is handed over, also into a slow pipe. A reader that stops early, such as `head`, is no fault. */
function print(text: string): Promise<void> {
  process.stdout.on('error', () => {});
  return new Promise((resolve) => {
    process.stdout.write(text, () => resolve());
  });
}
