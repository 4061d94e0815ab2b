import { expect, test } from 'vitest';
import { readConfig } from '../../server/config';

const DATABASE_URL = 'postgres://heddle@127.0.0.1/heddle';

test('only the address of the database is needed', () => {
  expect(readConfig({ DATABASE_URL })).toMatchObject({
    port: 3000,
    host: '127.0.0.1',
    publicOrigin: null,
    secure: false,
    trustedProxies: 0,
    demo: false,
    redisUrl: null,
    spaFolder: null,
  });
});

test('empty settings count as unset', () => {
  expect(readConfig({ DATABASE_URL, PORT: '', REDIS_URL: '', HEDDLE_DEMO: '' }).port).toBe(3000);
});

test('pages over https make cookies secure', () => {
  const config = readConfig({ DATABASE_URL, PUBLIC_URL: 'https://heddle.example.org/' });
  expect(config).toMatchObject({ secure: true, publicOrigin: 'https://heddle.example.org' });
});

test.each([
  ['no database', {}, /^DATABASE_URL is not set: .+\.$/],
  ['another database', { DATABASE_URL: 'mysql://x' }, /^DATABASE_URL is "mysql:\/\/…": must begin/],
  ['a wrong port', { DATABASE_URL, PORT: '70000' }, /^PORT is "70000": /],
  ['a word for a port', { DATABASE_URL, PORT: 'http' }, /^PORT is "http": /],
  ['an open demo', { DATABASE_URL, HEDDLE_DEMO: 'yes' }, /^HEDDLE_DEMO is "yes": /],
  [
    'a public address in the clear',
    { DATABASE_URL, PUBLIC_URL: 'http://heddle.example.org' },
    /https/,
  ],
  ['an open address without a name', { DATABASE_URL, HOST: '0.0.0.0' }, /^PUBLIC_URL is not set: /],
])('%s is refused in one plain sentence', (_kind, environment, sentence) => {
  expect(() => readConfig(environment)).toThrow(sentence);
});

test('a password in the address of the database is not shown', () => {
  const wrong = { DATABASE_URL: 'pg://heddle:secret@127.0.0.1/heddle' };
  expect(() => readConfig(wrong)).toThrow(/^(?!.*secret)/);
});
