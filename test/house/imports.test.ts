import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { z } from 'zod';
import { adding, arrows, environment, markup, unpinned, type Rule } from './rules';
import { ROOT, sourcesBelow } from './source';

const sources = sourcesBelow(['src', 'server', 'db', 'jobs', 'formats', 'models']);
const broken = (rule: Rule): string[] => sources.flatMap(rule);
const planted = (rule: Rule, path: string, text: string): string[] => rule({ path, text });

describe('the arrows between folders', () => {
  it('go only where the table allows', () => {
    expect(sources.length).toBeGreaterThan(100);
    expect(broken(arrows)).toEqual([]);
  });

  it.each([
    [
      'src/pages/APage.vue',
      `<script setup lang="ts">\nimport { db } from '../../db/client';\n</script>`,
      2,
    ],
    ['src/pages/APage.vue', `<script lang="ts">\nimport '../../server/app';\n</script>`, 2],
    ['src/stores/run.ts', `import { readFile } from 'node:fs/promises';`, 1],
    ['server/contract/runs.ts', `import { pg } from 'pg';`, 1],
    ['server/contract/runs.ts', `export * from '../app';`, 1],
    ['server/runs/usecases.ts', `import { prepare } from '../../jobs/engine/index';`, 1],
    ['server/runs/usecases.ts', `import type { Relay } from '../../jobs/relay';`, 1],
    ['server/runs/usecases.ts', `\nconst { Queue } = await import('bullmq');`, 2],
    ['db/repositories/runs.ts', `import { present } from '../../server/runs/presenter';`, 1],
    ['db/repositories/runs.ts', `import { run } from '#contract/runs';`, 1],
    ['jobs/engine/index.ts', `import { performance } from 'node:perf_hooks';`, 1],
    ['jobs/engine/index.ts', `import { pool } from '../pool/pool';`, 1],
    ['jobs/pool/pool.ts', `import { db } from '../../db/client';`, 1],
    ['jobs/queue/jobs.ts', `import { runs } from '../../db/schema/runs';`, 1],
    ['jobs/handlers/plan.ts', `import { app } from '../../server/app';`, 1],
    ['db/seed/saltmere.ts', `import { datasets } from '../schema/datasets';`, 1],
    ['formats/csv.ts', `import { z } from 'zod';`, 1],
    ['formats/csv.ts', `import { UPLOAD_LIMITS } from '#contract/datasets';`, 1],
  ])('in %s: %s is caught', (path, text, line) => {
    expect(planted(arrows, path, text)).toHaveLength(1);
    expect(planted(arrows, path, text)[0]).toContain(`${path}:${line} `);
  });

  it.each([
    [
      'src/pages/APage.vue',
      `<script setup lang="ts">\nimport type { Run } from '#contract/runs';\n</script>`,
    ],
    [
      'server/runs/usecases.ts',
      `import { x } from '../../jobs/queue/jobs';\nimport '../contract/runs';`,
    ],
    ['db/schema/enums.ts', `import { ROLES } from '#contract/enums';`],
    ['jobs/pool/thread.ts', `import { prepare } from '../engine/index';`],
    ['jobs/handlers/plan.ts', `import { prepare } from '../engine/index';`],
  ])('in %s: %s is allowed', (path, text) => {
    expect(planted(arrows, path, text)).toEqual([]);
  });
});

describe('jobs', () => {
  it('are added by the relay through the producer, and nowhere else', () => {
    expect(broken(adding)).toEqual([]);
  });

  it.each([
    ['server/runs/usecases.ts', `await queue.add('plan', {});`],
    ['server/runs/usecases.ts', `await this.runQueue.addBulk([]);`],
    ['jobs/handlers/plan.ts', `await context.producer.add({ name: 'blocks' });`],
    ['jobs/reconciler.ts', `await queueOf('plan').add('plan', {});`],
    ['jobs/reconciler.ts', `import { FlowProducer } from 'bullmq';`],
  ])('added in %s by %s are caught', (path, text) => {
    expect(planted(adding, path, text)).toHaveLength(1);
  });

  it('are not mistaken for members of a set', () => {
    expect(planted(adding, 'jobs/reconciler.ts', `seen.add(1);`)).toEqual([]);
  });
});

describe('the environment', () => {
  it('is read in config.ts alone', () => {
    expect(broken(environment)).toEqual([]);
  });

  it.each([
    `const url = process.env.DATABASE_URL;`,
    `const url = process['env'];`,
    `const { env } = process;`,
    `const { env: settings } = process;`,
  ])('read by %s is caught', (text) => {
    expect(planted(environment, 'server/app.ts', text)).toHaveLength(1);
    expect(planted(environment, 'server/config.ts', text)).toEqual([]);
  });
});

describe('markup', () => {
  it('is never made from a string', () => {
    expect(broken(markup)).toEqual([]);
  });

  it.each([
    `<div v-html="label"></div>`,
    `<q-tooltip :html="true" html>x</q-tooltip>`,
    `element.innerHTML = label;`,
    `$q.notify({ message, html: true });`,
  ])('made by %s is caught', (text) => {
    expect(planted(markup, 'src/pages/APage.vue', text)).toHaveLength(1);
  });
});

describe('packages', () => {
  const versions = z.record(z.string(), z.string());
  const manifest = z
    .object({ dependencies: versions, devDependencies: versions })
    .parse(JSON.parse(readFileSync(join(ROOT, 'package.json'), 'utf8')));

  it('are pinned to one version each', () => {
    expect(unpinned(manifest)).toEqual([]);
  });

  it.each(['^1.2.3', '~1.2.3', '1.2', '*', 'latest', '>=1.0.0', 'github:a/b'])(
    'written as %s are caught',
    (version) => {
      expect(unpinned({ dependencies: { a: version }, devDependencies: { b: '1.0.0' } })).toEqual([
        `a ${version}`,
      ]);
    },
  );
});
