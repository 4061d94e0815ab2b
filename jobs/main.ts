import pino from 'pino';
import { ConfigurationError, readConfig } from './config';
import { startWorker, type RunningWorker } from './worker';

/** Milliseconds in which a worker that was told to end must be gone. */
const LAST_CALL = 9_000;

function fail(error: unknown): never {
  const plain = error instanceof ConfigurationError;
  process.stderr.write(`The worker cannot start: ${plain ? error.message : String(error)}\n`);
  process.exit(1);
}

function start(): void {
  const config = readConfig();
  const log = pino({ name: 'worker', level: config.logLevel });
  const worker: RunningWorker = startWorker(config, log);
  log.info({ threads: config.threads }, 'worker started');

  const end = (signal: NodeJS.Signals) => {
    log.info({ signal }, 'worker hands over');
    // Whatever still hangs then is left to the next worker: the database knows what is unfinished.
    setTimeout(() => process.exit(0), LAST_CALL).unref();
    worker.close().then(
      () => process.exit(0),
      (error: unknown) => {
        log.error({ err: error }, 'handing over failed');
        process.exit(1);
      },
    );
  };
  process.once('SIGTERM', end);
  process.once('SIGINT', end);
  process.on('unhandledRejection', (error) => log.error({ err: error }, 'unhandled rejection'));
}

try {
  start();
} catch (error) {
  fail(error);
}
