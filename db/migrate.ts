import { existsSync } from 'node:fs';
import { join } from 'node:path';
import { drizzle } from 'drizzle-orm/node-postgres';
import { migrate } from 'drizzle-orm/node-postgres/migrator';
import pg from 'pg';
import { databaseUrlFromEnvironment } from './config';

/** Any number that nobody else locks; every process that migrates takes this one. */
const MIGRATION_LOCK = 4_733_551;

/** @returns the folder of the SQL files, beside the source or, in a build, one level up. */
export function migrationsFolder(): string {
  const candidates = [
    join(import.meta.dirname, 'migrations'),
    join(import.meta.dirname, '..', 'db', 'migrations'),
  ];
  const found = candidates.find((folder) => existsSync(join(folder, 'meta', '_journal.json')));
  if (!found) throw new Error(`No migrations in ${candidates.join(' or ')}.`);
  return found;
}

/**
 * Brings the database up to the newest schema. Any number of processes may call it at once: one
 * migrates under an advisory lock, the others wait for it and find nothing left to do.
 *
 * @param url PostgreSQL address of a database that exists
 */
export async function migrateDatabase(url: string, folder = migrationsFolder()): Promise<void> {
  const client = new pg.Client({
    connectionString: url,
    application_name: 'heddle-migrate',
    connectionTimeoutMillis: 10_000,
  });
  client.on('error', () => undefined);
  await client.connect();
  try {
    await client.query('select pg_advisory_lock($1)', [MIGRATION_LOCK]);
    await migrate(drizzle(client), { migrationsFolder: folder });
  } finally {
    // The lock belongs to the session and ends with it.
    await client.end();
  }
}

const reason = (error: unknown): string => {
  if (error instanceof AggregateError) return error.errors.map(reason).join('; ');
  return error instanceof Error ? error.message : String(error);
};

// In a bundle this module shares its address with others: the name of the command decides.
if (/[\\/]migrate\.(ts|js)$/.test(process.argv[1] ?? '')) {
  try {
    await migrateDatabase(databaseUrlFromEnvironment());
    process.stdout.write('The database has the newest schema.\n');
  } catch (error) {
    process.stderr.write(`The database could not be migrated: ${reason(error)}\n`);
    process.exitCode = 1;
  }
}
