/**
 * `npm test`: everything that must hold before a change lands, in one plain Node script that needs nothing installed.
 * Steps run one after another; a failing step does not hide the ones after it, except when nothing could run without it.
 *   node test/run.mjs                 all steps
 *   node test/run.mjs types unit      only these
 */
import { spawnSync } from 'node:child_process';
import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { ensureInstalled, explainOldNode } from '../prisma/launch/install.mjs';

const ROOT = dirname(dirname(fileURLToPath(import.meta.url)));
const BIN = join(ROOT, 'node_modules', '.bin');
const REPORTS = mkdtempSync(join(tmpdir(), 'elbowroom-test-'));

const STEPS = [
  { name: 'generate', script: 'generate', isNeededByRest: true },
  { name: 'types', command: ['tsc', '--noEmit', '-p', '.'] },
  { name: 'lint', command: ['biome', 'check', '--error-on-warnings', '.'] },
  {
    name: 'directions',
    command: ['depcruise', '--config', '.dependency-cruiser.cjs', 'lib', 'app', 'seed', 'prisma'],
  },
  { name: 'unused', command: ['knip'] },
  { name: 'build', script: 'build' },
  { name: 'unit', project: 'unit' },
  { name: 'reference', project: 'reference' },
  { name: 'integration', project: 'integration' },
  { name: 'browser', project: 'browser' },
];

function runStep(step) {
  const report = join(REPORTS, `${step.name}.json`);
  const [program, ...args] = commandOf(step, report);
  const started = Date.now();
  console.log(`\n── ${step.name} ──────────────────────────────`);
  const run = spawnSync(program, args, {
    cwd: ROOT,
    stdio: 'inherit',
    env: { ...process.env, NEXT_TELEMETRY_DISABLED: '1', PRISMA_HIDE_UPDATE_MESSAGE: '1', FORCE_COLOR: '0' },
  });
  const isGood = run.status === 0;
  const seconds = ((Date.now() - started) / 1000).toFixed(1);
  return { name: step.name, isGood, seconds, ...readCounts(report, isGood) };
}

/** A step is a vitest project, a script of package.json, or a program of the installed packages. */
function commandOf({ project, script, command }, report) {
  if (script) return ['npm', 'run', '--silent', script];
  if (command) return [join(BIN, command[0]), ...command.slice(1)];
  const reporters = ['--reporter=default', '--reporter=json', `--outputFile.json=${report}`];
  return [join(BIN, 'vitest'), 'run', '--project', project, ...reporters];
}

/** Tests of a vitest step; a step that is no test run counts as one check. */
function readCounts(report, isGood) {
  if (!existsSync(report)) return { passed: isGood ? 1 : 0, failed: isGood ? 0 : 1, skipped: 0 };
  const { numPassedTests, numFailedTests, numPendingTests } = JSON.parse(readFileSync(report, 'utf8'));
  return { passed: numPassedTests, failed: numFailedTests || (isGood ? 0 : 1), skipped: numPendingTests };
}

function sum(results, key) {
  return results.reduce((total, result) => total + result[key], 0);
}

function main() {
  const tooOld = explainOldNode();
  if (tooOld) {
    console.error(tooOld);
    return 1;
  }
  try {
    ensureInstalled(ROOT);
  } catch (problem) {
    console.error(problem.message);
    return 1;
  }
  const wanted = process.argv.slice(2);
  const unknown = wanted.filter((name) => !STEPS.some((step) => step.name === name));
  if (unknown.length > 0) {
    console.error(
      `No step is called ${unknown.join(', ')}. Steps: ${STEPS.map((step) => step.name).join(', ')}.`,
    );
    return 2;
  }
  const results = [];
  for (const step of STEPS) {
    if (wanted.length > 0 && !wanted.includes(step.name)) continue;
    const result = runStep(step);
    results.push(result);
    if (!result.isGood && step.isNeededByRest) break;
  }
  rmSync(REPORTS, { recursive: true, force: true });
  console.log('\n── summary ──────────────────────────────');
  for (const { name, isGood, passed, failed, skipped, seconds } of results) {
    console.log(
      `${isGood ? 'ok    ' : 'FAILED'} ${name.padEnd(12)} ${passed} passed, ${failed} failed, ${skipped} skipped  ${seconds} s`,
    );
  }
  console.log(
    `${sum(results, 'passed')} passed, ${sum(results, 'failed')} failed, ${sum(results, 'skipped')} skipped`,
  );
  return results.every((result) => result.isGood) ? 0 : 1;
}

process.exitCode = main();
