import { ROLES, type Role } from '#contract/enums';
import { openDatabase } from '../db/client';
import { makePasswords } from './auth/passwords';
import { ConfigurationError, readConfig } from './config';
import { DEMO_ACCOUNTS } from './demo/accounts';
import { seedDemo, type SeedOutcome } from './demo/seedDemo';

const SAID: Readonly<Record<SeedOutcome, string>> = {
  made: 'The demo workspace is made; a worker finishes its run.',
  present: 'The demo workspace is there already.',
  foreign: 'This instance has accounts of its own, so no demo was made.',
};

/** The accounts by role, for the person who started the demo instance. */
function accountLines(): string[] {
  const passwords = [...new Set(DEMO_ACCOUNTS.map(({ password }) => password))];
  const emailsOf = (wanted: Role) =>
    DEMO_ACCOUNTS.filter(({ role }) => role === wanted).map(({ email }) => email);
  return [
    `Demo accounts (invented people); the password of each is: ${passwords.join(', ')}`,
    ...ROLES.map((role) => `  ${role.padEnd(9)} ${emailsOf(role).join('  ')}`),
  ];
}

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
    const outcome = await seedDemo(database.db, makePasswords());
    const lines = [SAID[outcome], ...(outcome === 'foreign' ? [] : accountLines())];
    process.stdout.write(`${lines.join('\n')}\n`);
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
