/** An embedded database in a process of its own, for tests that kill it: node embedded-process.mjs DATA_FOLDER SOCKET_FOLDER */
import { startEmbedded } from '../../prisma/embedded/start-embedded.mjs';

const [dataFolder, socketFolder] = process.argv.slice(2);
await startEmbedded({ dataFolder, socketFolder });
console.log('started');
