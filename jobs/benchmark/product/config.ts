import { join } from 'node:path';
import { z } from 'zod';

/** What `scripts/bench.mjs` has started for the product; absent where it is not measured. */
const environment = z.object({
  DATABASE_URL: z.string().startsWith('postgres'),
  REDIS_URL: z.string().startsWith('redis'),
  /** A free port of loopback for the server. */
  PORT: z.coerce.number().int().min(1),
});

export interface ProductConfig {
  readonly databaseUrl: string;
  readonly origin: string;
  /** The environment of a process of the product, as `npm start` sets it. */
  environmentOf(more: Readonly<Record<string, string>>): NodeJS.ProcessEnv;
}

/** @throws Error where the services of the product were not started */
export function readProductConfig(dist: string): ProductConfig {
  const parsed = environment.safeParse(process.env);
  if (!parsed.success) throw new Error('The product is measured by: npm run bench -- --product');
  const { DATABASE_URL, REDIS_URL, PORT } = parsed.data;
  const origin = `http://127.0.0.1:${PORT}`;
  return {
    databaseUrl: DATABASE_URL,
    origin,
    environmentOf: (more) => ({
      ...process.env,
      DATABASE_URL,
      REDIS_URL,
      PORT: String(PORT),
      PUBLIC_URL: origin,
      HEDDLE_DEMO: '0',
      HEDDLE_SPA_DIR: join(dist, 'spa'),
      HEDDLE_READING_SCRIPT: join(dist, 'reading.js'),
      LOG_LEVEL: 'error',
      ...more,
    }),
  };
}
