import type { Network } from '../engine/types';
import type { Pool } from '../pool/pool';
import { median, seconds, spread, times } from './figures';
import { constantProbability } from './graphs';
import { pairsOf } from './matrixSection';
import type { Options } from './options';
import { poolOf, warmUp, wholeMatrix } from './poolRuns';
import { readProductConfig } from './product/config';
import { openBrowser, openPage, paintRun, type PaintedRun } from './product/paintedRun';
import { Processes } from './product/processes';
import { sharesOf } from './product/shares';
import { Visitor } from './product/visitor';
import { watchRun, type WatchedRun } from './product/watchedRun';

const THREADS = 2;
const GRAPHS = [
  { name: 'A n=60 p=.4', network: constantProbability(60, 0.4, 1) },
  { name: 'A n=300 p=.2', network: constantProbability(300, 0.2, 1) },
] as const;

/** The product and the bare engine on one network, with what both need. */
interface Bench {
  readonly visitor: Visitor;
  readonly bare: Pool;
  readonly options: Options;
}

let uploads = 0;
const upload = ({ visitor }: Bench, network: Network) =>
  visitor.upload(`Bench ${++uploads}`, network);

/** From the submission, and from the click, to the matrix: the real server and workers. */
export async function productSection(options: Options): Promise<void> {
  console.log(
    '\n# Through the product, D = 3\n' +
      `One server and one worker of ${THREADS} threads on loopback, a database that writes through; beside ` +
      `them the bare engine with ${THREADS} threads, in turns. Uploads are not counted.`,
  );
  const config = readProductConfig(import.meta.dirname);
  const processes = new Processes(config, import.meta.dirname);
  const bare = poolOf(THREADS);
  process.once('SIGTERM', () => void processes.close().then(() => process.exit(1)));
  try {
    await processes.startServer();
    await processes.startWorkers(1, THREADS);
    await warmUp(bare);
    const visitor = new Visitor(config.origin);
    await visitor.signUp();
    const bench = { visitor, bare, options };
    // The first run of a worker compiles its code.
    await watched(bench, GRAPHS[0].network);
    for (const { name, network } of GRAPHS) await overHttp(bench, name, network);
    await inBrowser(bench, config.origin);
    await sharing(bench, processes, config.databaseUrl);
  } finally {
    await Promise.all([bare.close(), processes.close()]);
  }
}

async function watched(bench: Bench, network: Network): Promise<WatchedRun> {
  const { revisionId } = await upload(bench, network);
  return watchRun(bench.visitor, revisionId, pairsOf(network));
}

async function overHttp(bench: Bench, name: string, network: Network): Promise<void> {
  const engine: number[] = [];
  const runs: WatchedRun[] = [];
  for (let i = 0; i < bench.options.runs; i++) {
    engine.push((await wholeMatrix(bench.bare, network, 3)).seconds);
    runs.push(await watched(bench, network));
  }
  const whole = runs.map((run) => run.whole);
  const added = median(whole) - median(engine);
  console.log(
    `\n${name}, over HTTP: first rows ${spread(
      runs.map(({ first }) => first),
      seconds,
    )}, whole matrix ${spread(whole, seconds)}`,
  );
  console.log(
    `  bare engine ${spread(engine, seconds)}: ${seconds(added)} more, ` +
      `${((100 * added) / median(engine)).toFixed(0)} %`,
  );
}

async function inBrowser(bench: Bench, origin: string): Promise<void> {
  const browser = await openBrowser();
  try {
    const page = await openPage(browser, origin);
    for (const { name, network } of GRAPHS) {
      const engine: number[] = [];
      const runs: PaintedRun[] = [];
      for (let i = 0; i < bench.options.runs; i++) {
        engine.push((await wholeMatrix(bench.bare, network, 3)).seconds);
        const { datasetId } = await upload(bench, network);
        const path = `${origin}/workspaces/${bench.visitor.workspaceId}/datasets/${datasetId}`;
        runs.push(await paintRun(page, path));
      }
      const whole = runs.map((run) => run.whole);
      console.log(
        `\n${name}, from the click in Chromium: first cells ${spread(
          runs.map(({ first }) => first),
          seconds,
        )}, whole cloth ${spread(whole, seconds)}; bare engine ${spread(engine, seconds)}: ` +
          `${seconds(median(whole) - median(engine))} more`,
      );
    }
  } finally {
    await browser.close();
  }
}

/** Two worker processes against one, on the larger network. */
async function sharing(bench: Bench, processes: Processes, databaseUrl: string): Promise<void> {
  const { name, network } = GRAPHS[1];
  console.log(`\n${name}, worker processes × threads of each`);
  let alone = 0;
  for (const [count, threads] of [
    [1, 1],
    [1, 2],
    [2, 1],
  ] as const) {
    await processes.startWorkers(count, threads);
    for (let worker = 0; worker < count; worker++) await watched(bench, network);
    const runs: WatchedRun[] = [];
    for (let i = 0; i < bench.options.runs; i++) runs.push(await watched(bench, network));
    const whole = runs.map((run) => run.whole);
    if (alone === 0) alone = median(whole);
    console.log(
      `  ${count} × ${threads}: ${spread(whole, seconds)}, ${times(alone / median(whole))} as fast as 1 × 1`,
    );
    if (count === 1) continue;
    for (const { id } of runs) {
      const shares = await sharesOf(databaseUrl, id);
      console.log(
        `    ${shares
          .map(
            ({ blocks, pairs, estimated }) =>
              `${blocks} blocks, ${pairs.toLocaleString('en')} pairs, estimated at ${seconds(estimated)}`,
          )
          .join(' | ')}`,
      );
    }
  }
}
