import { openDatabase } from '../db/client';
import { makePasswords } from './auth/passwords';
import { ConfigurationError, readConfig } from './config';
import { seedDemo, type SeedOutcome } from './demo/seedDemo';

const SAID: Readonly<Record<SeedOutcome, string>> = {
  made: 'The demo workspace is made; a worker will finish its run.',
  present: 'The demo workspace is there already.',
  foreign: 'This instance has accounts of its own, so no demo was made.',
};

async function main(): Promise<void> {
  const config = readConfig();
  if (!config.demo) {
    throw new ConfigurationError(
      'HEDDLE_DEMO is not 1: demo accounts and data are made in a demo instance only.',
    );
  }
  const database = openDatabase({
    url: config.databaseUrl,
    name: 'heddle-seed',
    onError: (error) => process.stderr.write(`${error.message}\n`),
  });
  try {
    process.stdout.write(`${SAID[await seedDemo(database.db, makePasswords())]}\n`);
  } finally {
    await database.close();
  }
}

try {
  await main();
} catch (error) {
  const plain = error instanceof ConfigurationError ? error.message : String(error);
  process.stderr.write(`The demo could not be made: ${plain}\n`);
  process.exitCode = 1;
}
