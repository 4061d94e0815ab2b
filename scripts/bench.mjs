/** `npm run bench`: this engine against loops over outside programs, in one run on one machine. */
import { spawn } from 'node:child_process';
import { join } from 'node:path';
import { root } from './paths.mjs';
import { asCommand, requireNode } from './plain.mjs';
import { ensureBuilt, ensurePackages } from './prepare.mjs';
import { ensurePrograms } from './programs.mjs';

await asCommand(async () => {
  requireNode();
  ensurePrograms({ forTests: true });
  ensurePackages();
  await ensureBuilt({ spa: false });
  const child = spawn(process.execPath, [join(root, 'dist/bench.js'), ...process.argv.slice(2)], {
    cwd: root,
    stdio: 'inherit',
  });
  child.once('exit', (code) => (process.exitCode = code ?? 1));
});
