/** Last step of `npm run build`: notes which sources the build was made from, so that `npm start` need not build again. */
import { dirname } from 'node:path';
import { fileURLToPath } from 'node:url';
import { stampBuild } from './build.mjs';
import { readSettings } from './settings.mjs';

const root = dirname(dirname(dirname(fileURLToPath(import.meta.url))));
stampBuild(root, readSettings(root, []).distFolder);
