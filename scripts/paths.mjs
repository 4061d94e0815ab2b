/** Where the clone lies, and where everything that a run leaves behind is kept. */
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

export const root = dirname(dirname(fileURLToPath(import.meta.url)));
/** State of `npm start`: cluster, Redis, ports, passwords, logs, mails. */
export const stateDir = join(root, '.heddle');
