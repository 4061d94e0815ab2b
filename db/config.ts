/**
 * The only setting of the migration command. The processes that serve and compute parse theirs in
 * server/config.ts and jobs/config.ts.
 *
 * @returns DATABASE_URL, a PostgreSQL address
 * @throws Error in plain words if it is missing
 */
export function databaseUrlFromEnvironment(): string {
  const url = process.env['DATABASE_URL'];
  if (!url) {
    throw new Error(
      'DATABASE_URL is not set. Give the address of the PostgreSQL database, such as ' +
        'postgres://heddle@127.0.0.1:5432/heddle.',
    );
  }
  return url;
}
