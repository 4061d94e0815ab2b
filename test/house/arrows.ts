/**
 * Which folder may import what. The longest matching folder decides; a folder always reaches
 * itself. `packages` and `folders` name what else it may reach: a package with all its sub-paths, a
 * folder with all below it.
 */
export interface Folder {
  readonly folder: string;
  readonly packages: readonly string[];
  readonly folders: readonly string[];
}

/** Built-in modules are named singly where a folder is held to few, `node:*` where all are allowed. */
const NODE = 'node:*';

export const FOLDERS: readonly Folder[] = [
  { folder: 'server/contract', packages: ['zod'], folders: [] },
  // Pure mathematics: no clock, no file, no global random.
  { folder: 'jobs/engine', packages: [], folders: [] },
  {
    folder: 'jobs/pool',
    packages: ['piscina', 'node:worker_threads', 'node:url', 'node:os'],
    folders: ['jobs/engine'],
  },
  { folder: 'jobs/queue', packages: ['bullmq', 'ioredis', 'zod', NODE], folders: [] },
  {
    folder: 'formats',
    packages: ['csv-parse', 'csv-stringify', 'saxes', 'node:crypto', 'node:stream'],
    folders: [],
  },
  {
    folder: 'db',
    packages: ['drizzle-orm', 'pg', 'zod', NODE],
    folders: ['server/contract/enums.ts'],
  },
  // Invented networks, as text: from seeds alone.
  { folder: 'db/seed', packages: ['pure-rand'], folders: [] },
  // Invented networks of published models: from seeds alone.
  { folder: 'models', packages: ['pure-rand'], folders: [] },
  {
    folder: 'jobs',
    packages: ['bullmq', 'ioredis', 'zod', 'pino', 'nodemailer', NODE],
    folders: ['db', 'formats'],
  },
  // Measures the whole product from outside, so it speaks the contract like the pages do.
  {
    folder: 'jobs/benchmark',
    packages: ['zod', '@playwright/test', NODE],
    folders: ['jobs', 'db', 'server/contract'],
  },
  {
    folder: 'server',
    packages: [
      ...['express', 'zod', 'pino', 'pino-http', 'helmet', 'compression', 'busboy', 'ioredis'],
      ...[
        'rate-limiter-flexible',
        'piscina',
        'lucia',
        'oslo',
        '@lucia-auth/adapter-drizzle',
        'drizzle-orm',
      ],
      NODE,
    ],
    folders: ['db', 'formats', 'models', 'jobs/queue'],
  },
  {
    folder: 'src',
    packages: [
      ...['vue', 'vue-router', 'pinia', 'quasar', '@quasar/extras', '@fontsource/inter', 'd3'],
      ...['graphology', 'graphology-communities-louvain', 'graphology-metrics', 'graphology-types'],
      ...['zod', 'pure-rand', '#q-app'],
    ],
    folders: ['server/contract'],
  },
];

const lies = (path: string, folder: string): boolean =>
  path === folder || path.startsWith(`${folder}/`);

/** @returns the rule of the deepest folder that holds the file, or null outside all of them. */
export function folderOf(file: string): Folder | null {
  const holding = FOLDERS.filter(({ folder }) => lies(file, folder));
  return holding.reduce<Folder | null>(
    (deepest, one) => (deepest && deepest.folder.length > one.folder.length ? deepest : one),
    null,
  );
}

/**
 * @param file path in the repository of the importing file
 * @param target a package or built-in as written, or the path in the repository of a file
 * @returns whether the table allows the arrow
 */
export function mayImport(file: string, target: { package: string } | { path: string }): boolean {
  const rule = folderOf(file);
  if (!rule) return true;
  if ('package' in target) {
    const name = target.package;
    return rule.packages.some(
      (one) => lies(name, one) || (one === NODE && name.startsWith('node:')),
    );
  }
  const { path } = target;
  const own = folderOf(path)?.folder;
  // A folder reaches what is its own; jobs and all below it are one house, save the held ones.
  if (own === rule.folder || (rule.folder === 'jobs' && lies(path, 'jobs'))) return true;
  if (rule.folder === 'server' && lies(path, 'server')) return true;
  return rule.folders.some((one) => lies(path, one) || lies(`${path}.ts`, one));
}
