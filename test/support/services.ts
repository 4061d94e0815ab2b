/** Servers that the tests use; `npm test` starts its own and names them here. */
export const POSTGRES = process.env.HEDDLE_TEST_DATABASE_URL;
export const REDIS = process.env.HEDDLE_TEST_REDIS_URL;

/** @throws Error in plain words where the tests were started without their servers. */
export function needed(url: string | undefined, name: string): string {
  if (url) return url;
  throw new Error(
    `${name} is not set. Run "npm test", which starts servers of its own, or name one that the tests may use.`,
  );
}
