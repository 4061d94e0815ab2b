import { EngineInputError, EngineLimitError } from './engine/types';
import { computeMatrix, FileTrouble, WrongFiles } from './matrix/command';
import { readOptions, USAGE, UsageError } from './matrix/options';

/** Exit status: 0 done, 1 wrong input or a limit passed, 2 called wrongly. */
const WRONG_INPUT = 1;
const WRONG_CALL = 2;

/** Milliseconds between two lines of progress. */
const INTERVAL = 1_000;

/** A line of progress that rewrites itself, on a terminal only. */
function progressLine(): (done: number, total: number) => void {
  if (!process.stderr.isTTY) return () => undefined;
  let last = Date.now();
  process.on('exit', () => process.stderr.write('\r\u001b[K'));
  return (done, total) => {
    if (Date.now() - last < INTERVAL) return;
    last = Date.now();
    process.stderr.write(`\r\u001b[K${done} of ${total} pairs`);
  };
}

/** Errors that a person can do something about; any other is a fault of ours. */
const PLAIN = [WrongFiles, FileTrouble, EngineLimitError, EngineInputError, UsageError];

function report(error: unknown): void {
  if (error instanceof WrongFiles) {
    for (const { file, line, field, message } of error.issues) {
      const place = [file, line && `line ${line}`, field].filter(Boolean).join(', ');
      process.stderr.write(`${place}: ${message}\n`);
    }
    if (error.leftOut > 0) process.stderr.write(`and ${error.leftOut} more.\n`);
  }
  const { message, stack } = error instanceof Error ? error : new Error(String(error));
  const plain = PLAIN.some((kind) => error instanceof kind);
  process.stderr.write(`${plain ? message : `This is a fault of Heddle: ${stack}`}\n`);
  process.exitCode = error instanceof UsageError ? WRONG_CALL : WRONG_INPUT;
}

// Whoever reads our output may stop reading (`| head`); that is no error.
process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  process.exit(error.code === 'EPIPE' ? 0 : WRONG_INPUT);
});

try {
  const options = readOptions(process.argv.slice(2));
  if (options === 'help') process.stdout.write(USAGE);
  else await computeMatrix(options, { output: process.stdout, onProgress: progressLine() });
} catch (error) {
  report(error);
}
