import { saltmere } from './saltmere';
import type { DemoNetwork } from './source';
import { ternBank } from './ternBank';
import { workedCases } from './workedCases';

export type { DemoNetwork } from './source';

/** The networks of the demo workspace in the order in which they are made; the last is the newest. */
export function demoNetworks(): DemoNetwork[] {
  return [...workedCases().reverse(), ternBank(), saltmere()];
}
