/**
 * `npm run bench`: the figures of the engine and of the product beside outside programs and the first
 * form of the algorithm, in one run on one machine. `options.ts` lists what may be chosen.
 */
import { availableParallelism, cpus, loadavg } from 'node:os';
import { ENGINE_VERSION } from '../engine/index';
import { firstFormSection } from './firstFormSection';
import { growthSection } from './growthSection';
import { matrixSection } from './matrixSection';
import { productSection } from './productSection';
import { readOptions, type Options, type Section } from './options';

const RUN: Record<Section, (options: Options) => Promise<void>> = {
  matrix: matrixSection,
  'first-form': firstFormSection,
  growth: growthSection,
  product: productSection,
};

async function main(): Promise<void> {
  const options = readOptions(process.argv.slice(2));
  console.log(
    `engine ${ENGINE_VERSION}, Node.js ${process.versions.node}, ${availableParallelism()} × ` +
      `${cpus()[0]?.model ?? 'processor'}, load before ${loadavg()[0]?.toFixed(1)}`,
  );
  for (const section of options.sections) await RUN[section](options);
}

try {
  await main();
} catch (error) {
  console.error(error instanceof Error ? error.message : error);
  process.exitCode = 1;
}
