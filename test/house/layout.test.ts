import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { ROOT } from './source';

/** Every place of the house: a file, or a folder (with `/`) that holds at least one file. */
const PLACES = [
  ...['README.md', 'DEVELOPERS.md', 'package.json', 'quasar.config.ts', 'index.html', 'public/'],
  '.ci/run',
  ...['router/', 'layouts/', 'pages/', 'components/', 'composables/', 'drawings/'].map(inSrc),
  ...['stores/', 'api/', 'css/'].map(inSrc),
  ...['main.ts', 'app.ts', 'config.ts', 'http/', 'auth/', 'contract/'].map(
    (name) => `server/${name}`,
  ),
  ...['client.ts', 'schema/', 'repositories/', 'codecs/', 'migrations/'].map(
    (name) => `db/${name}`,
  ),
  ...['main.ts', 'queue/', 'handlers/', 'pool/', 'engine/'].map((name) => `jobs/${name}`),
  ...['support/', 'published/', 'reference/'].map((name) => `test/${name}`),
  ...['pages/', 'fixtures.ts'].map((name) => `e2e/${name}`),
];

/** Places that the plan of the house has and nothing needs so far; a file in one moves it to PLACES. */
const NOT_YET = ['src/boot/', 'server/mail/'];

function inSrc(name: string): string {
  return `src/${name}`;
}

/** @returns the places that do not exist, or are folders without a file. */
function missing(places: readonly string[], holds: (place: string) => boolean): string[] {
  return places.filter((place) => !holds(place));
}

const holds = (place: string): boolean => {
  const path = join(ROOT, place);
  if (!existsSync(path) || !place.endsWith('/')) return existsSync(path);
  return readdirSync(path, { recursive: true, withFileTypes: true }).some((one) => one.isFile());
};

describe('the layout of the house', () => {
  it('is whole', () => {
    expect(missing(PLACES, holds)).toEqual([]);
  });

  it('has nothing in the places that nothing needs so far', () => {
    expect(missing(NOT_YET, holds)).toEqual(NOT_YET);
  });

  it('a missing file, a missing folder and an empty folder are caught', () => {
    const places = ['README.md', 'server/none.ts', 'none/', 'db/schema/'];
    expect(missing(places, holds)).toEqual(['server/none.ts', 'none/']);
    expect(missing(['a/', 'b/'], (place) => place === 'a/')).toEqual(['b/']);
  });
});

describe('the settings', () => {
  /** Names of the settings that a config.ts reads: the keys of its schema. */
  const settingsOf = (text: string): string[] =>
    [...text.matchAll(/^ {2}([A-Z][A-Z0-9_]+): z/gm)].flatMap(([, name]) => name ?? []);
  const unnamed = (settings: readonly string[], readme: string): string[] =>
    settings.filter((name) => !readme.includes(`\`${name}\``));
  const textOf = (path: string): string => readFileSync(join(ROOT, path), 'utf8');

  it.each(['server/config.ts', 'jobs/config.ts'])('of %s are all in the README', (path) => {
    const settings = settingsOf(textOf(path));
    expect(settings.length).toBeGreaterThan(8);
    expect(unnamed(settings, textOf('README.md'))).toEqual([]);
  });

  it('one that the README leaves out is caught', () => {
    const settings = settingsOf('  PORT: z.string(),\n  HEDDLE_NEW: z.preprocess(filled),\n');
    expect(unnamed(settings, 'The `PORT` and HEDDLE_NEW')).toEqual(['HEDDLE_NEW']);
  });
});
