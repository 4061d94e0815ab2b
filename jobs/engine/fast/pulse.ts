import { EngineStopped, type Control } from '../types';

/** Row additions and table entries between two looks at `shouldStop`: a few milliseconds of work. */
const UNITS_PER_LOOK = 100_000;

/**
 * Turns counted work into looks at the control, since the engine has no clock. One unit is about
 * ten nanoseconds of work.
 */
export class Pulse {
  /** Pairs finished so far, as reported to `onProgress`. */
  pairsDone = 0;
  private units = 0;

  constructor(private readonly control: Control) {}

  /** Throws EngineStopped when asked to stop. */
  tick(units: number): void {
    this.units += units;
    if (this.units >= UNITS_PER_LOOK) this.look();
  }

  look(): void {
    this.units = 0;
    if (this.control.shouldStop()) throw new EngineStopped('The computation was stopped.');
    this.control.onProgress(this.pairsDone);
  }
}
