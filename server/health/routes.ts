import type { Dependencies } from '../dependencies';
import { Failure } from '../http/failure';
import { ok, route, type RouteMap } from '../http/route';

/** Seconds without a consumed job after which the instance counts as not ready. */
const LATELY = 60;

export function healthRoutes({
  secondsSinceJob,
}: Dependencies): Pick<RouteMap, 'health' | 'ready'> {
  return {
    health: route('health', {}, () => Promise.resolve(ok({ status: 'alive' }))),
    ready: route('ready', {}, async () => {
      const seconds = await secondsSinceJob();
      if (seconds === null || seconds > LATELY) throw noWorker(seconds);
      return ok({ status: 'ready', secondsSinceJob: Math.round(seconds) });
    }),
  };
}

function noWorker(seconds: number | null): Failure {
  const since =
    seconds === null
      ? 'No job was ever consumed'
      : `The last job was consumed ${Math.round(seconds)} s ago`;
  return new Failure(
    'unavailable',
    'service.no_worker',
    `${since}; start a worker, or see whether it reaches the queue.`,
    { retryAfter: 5 },
  );
}
