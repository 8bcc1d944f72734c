/**
 * `npm start`: everything from a fresh clone to a running app, in one plain Node script that needs nothing installed.
 *   node start.mjs            run from a build
 *   node start.mjs --dev      run from the sources, reloading them
 *   node start.mjs --verbose  show every line that the web server and the worker print
 * README.md lists the environment variables. Exit codes: 0 stopped, 1 did not start or ended by itself.
 */
import { dirname } from 'node:path';
import { fileURLToPath } from 'node:url';
import { explainOldNode } from './prisma/launch/install.mjs';

const tooOld = explainOldNode();
if (tooOld === null) {
  const { launch } = await import('./prisma/launch/launch.mjs');
  process.exitCode = await launch(dirname(fileURLToPath(import.meta.url)), process.argv.slice(2));
} else {
  console.error(tooOld);
  process.exitCode = 1;
}
