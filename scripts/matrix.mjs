/** `npm run matrix`: the swap matrix of a network on files, without a database. */
import { spawn } from 'node:child_process';
import { join } from 'node:path';
import { root } from './paths.mjs';
import { asCommand, requireNode } from './plain.mjs';
import { ensureBuilt, ensurePackages } from './prepare.mjs';

await asCommand(async () => {
  requireNode();
  ensurePackages();
  await ensureBuilt({ spa: false });
  const child = spawn(process.execPath, [join(root, 'dist/matrix.js'), ...process.argv.slice(2)], {
    // Paths are those of the folder in which the person typed the command.
    cwd: process.env.INIT_CWD ?? process.cwd(),
    stdio: 'inherit',
  });
  child.once('exit', (code) => (process.exitCode = code ?? 1));
});
