import { resolve } from 'node:path';
import type { Logger } from 'pino';
import type { Issue } from '#contract/problems';
import { invalid } from '../http/parse';
import { makeTurns } from '../http/turns';
import { runChild } from './childProcess';
import { readingBroken, tooManyReadings, wrongFiles } from './errors';
import type {
  DraftRequest,
  GrownOnDisk,
  GrowRequest,
  NetworkOnDisk,
  Problems,
  ReadAnswer,
  ReadDraft,
  ReadRequest,
  TwoFilesRequest,
} from './messages';

/** Megabytes of the process's heap; what does not fit is refused, and only that process ends. */
const HEAP = 1024;
/** Megabytes that it may hold in all, buffers of files included. */
const RESIDENT = 2048;
/** Seconds that one reading may take. */
const TIME = 120;
/** Readings that may wait for their turn. */
const WAITING = 8;
/** Issues that an answer carries. */
const LISTED = 200;

/** Reads files in a process of its own, one at a time, within limits of memory and time. */
export interface Reader {
  /** @throws Failure `datasets.wrong_files` with what is wrong, or past a limit */
  read(request: TwoFilesRequest): Promise<NetworkOnDisk>;
  /** @throws Failure past a limit */
  readDraft(request: DraftRequest): Promise<ReadDraft>;
  /** @throws Failure `datasets.wrong_files`, or past a limit */
  readDraftNetwork(request: DraftRequest): Promise<NetworkOnDisk>;
  /** @throws Failure past a limit */
  readProblems(request: DraftRequest): Promise<Problems>;
  /** Grows a network. @throws Failure `request.invalid` if too many edges come out, or past a limit */
  grow(request: GrowRequest): Promise<GrownOnDisk>;
  /** Ends the process that reads. */
  close(): Promise<void>;
}

export interface ReaderOptions {
  /** The built script of the reading process. */
  readonly script: string;
  readonly log: Logger;
  /** Megabytes of heap; 1024 unless told otherwise. */
  readonly heap?: number;
  /** Megabytes in all; 2048 unless told otherwise. */
  readonly resident?: number;
  /** Seconds; 120 unless told otherwise. */
  readonly time?: number;
}

export function makeReader(options: ReaderOptions): Reader {
  const { script, log, heap = HEAP, resident = RESIDENT, time = TIME } = options;
  const closing = new AbortController();
  // The time limit counts from the turn, not from the wait.
  const inTurn = makeTurns(1, WAITING, tooManyReadings);
  const limits = { heap, resident, time };
  let last: Promise<unknown> = Promise.resolve();
  const ask = (request: ReadRequest): Promise<ReadAnswer> =>
    inTurn(async () => {
      const running = runChild(resolve(script), request, limits, log, closing.signal);
      last = running.catch(() => undefined);
      const answer = await running;
      if (answer.kind !== 'broken') return answer;
      log.error({ fault: answer.message }, 'reading a file failed');
      throw readingBroken();
    });
  const network = async (request: ReadRequest): Promise<NetworkOnDisk> => {
    const answer = await ask(request);
    if (answer.kind === 'network') return answer.network;
    if (answer.kind === 'problems') throw wrongFiles(...listed(answer));
    throw mismatch(request, answer);
  };
  return {
    read: (request) => network({ kind: 'two_files', ...request }),
    readDraftNetwork: (request) => network({ kind: 'network', ...request }),
    readDraft: async (request) => {
      const answer = await ask({ kind: 'view', ...request });
      if (answer.kind === 'view') return answer.draft;
      throw mismatch({ kind: 'view', ...request }, answer);
    },
    readProblems: async (request) => {
      const answer = await ask({ kind: 'problems', ...request });
      if (answer.kind === 'problems') return answer;
      throw mismatch({ kind: 'problems', ...request }, answer);
    },
    grow: async (request) => {
      const answer = await ask({ kind: 'grown', ...request });
      if (answer.kind === 'grown') return answer;
      if (answer.kind === 'problems') throw invalid(answer.issues, answer.leftOut);
      throw mismatch({ kind: 'grown', ...request }, answer);
    },
    close: async () => {
      closing.abort();
      await last;
    },
  };
}

function listed({ issues, leftOut }: Problems): [readonly Issue[], number] {
  return [issues.slice(0, LISTED), leftOut + Math.max(0, issues.length - LISTED)];
}

const mismatch = (request: ReadRequest, answer: ReadAnswer): Error =>
  new Error(`The reading process was asked for ${request.kind} and answered ${answer.kind}.`);
