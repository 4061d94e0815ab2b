/** Computes one matrix of the benchmark and writes what memory it took (see `memoryOf`). */
import { benchGraphs, constantProbability } from '../graphs';
import { poolOf, wholeMatrix } from '../poolRuns';
import type { Memory } from './memoryOf';
import { beginPeak, peakBytes } from './peakMemory';

const [name, maxDimension, threads] = process.argv.slice(2);
const graph = benchGraphs.find((one) => one.name === name);
if (graph === undefined) throw new Error(`The benchmark has no graph '${name}'.`);
const network = graph.network();
const pool = poolOf(Number(threads));
// Starts the threads.
await wholeMatrix(pool, constantProbability(4, 1, 1), 1);
beginPeak();
const idle = peakBytes();
const { bytes: counted } = await wholeMatrix(pool, network, Number(maxDimension));
const found: Memory = { counted, resident: peakBytes(), idle };
console.log(JSON.stringify(found));
await pool.close();
