import { createHash, randomUUID } from 'node:crypto';
import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import pg from 'pg';
import { openDatabase, type Database } from '../../db/client';
import { migrateDatabase, migrationsFolder } from '../../db/migrate';
import { needed, POSTGRES } from './services';

/** Held while a template is made or copied: PostgreSQL copies only what nobody is connected to. */
const TEMPLATE_LOCK = 4_733_552;

export interface TestDatabase extends Database {
  /** Ends every connection and removes the database. */
  drop(): Promise<void>;
}

/** A migrated database of its own, copied from a template that is made once for these migrations. */
export async function freshDatabase(): Promise<TestDatabase> {
  const server = needed(POSTGRES, 'HEDDLE_TEST_DATABASE_URL');
  const name = `heddle_api_${randomUUID().replaceAll('-', '')}`;
  await onServer(server, async (client) => {
    await client.query('select pg_advisory_lock($1)', [TEMPLATE_LOCK]);
    await client.query(`create database ${name} template ${await template(server, client)}`);
  });
  const database = openDatabase({ url: addressOf(server, name) });
  return {
    ...database,
    drop: async () => {
      await database.close();
      await onServer(server, (client) => client.query(`drop database ${name} with (force)`));
    },
  };
}

async function template(server: string, client: pg.Client): Promise<string> {
  const folder = migrationsFolder();
  const content = createHash('sha256');
  for (const file of readdirSync(folder)
    .filter((one) => one.endsWith('.sql'))
    .sort()) {
    content.update(readFileSync(join(folder, file)));
  }
  const name = `heddle_template_${content.digest('hex').slice(0, 16)}`;
  const { rowCount } = await client.query('select 1 from pg_database where datname = $1', [name]);
  if (rowCount === 1) return name;
  const unfinished = `${name}_unfinished`;
  await client.query(`drop database if exists ${unfinished} with (force)`);
  await client.query(`create database ${unfinished}`);
  await migrateDatabase(addressOf(server, unfinished));
  await client.query(`alter database ${unfinished} rename to ${name}`);
  return name;
}

const addressOf = (server: string, name: string): string =>
  Object.assign(new URL(server), { pathname: `/${name}` }).href;

async function onServer(
  server: string,
  task: (client: pg.Client) => Promise<unknown>,
): Promise<void> {
  const client = new pg.Client(server);
  await client.connect();
  try {
    await task(client);
  } finally {
    await client.end();
  }
}
