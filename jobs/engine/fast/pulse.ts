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
  private done = 0;

  constructor(private control: Control) {}

  /** Answers to another control from now on. */
  begin(control: Control): void {
    this.control = control;
    this.pairsDone = 0;
  }

  /** Units of work done since the pulse was made; a measure of cost that every machine repeats. */
  get work(): number {
    return this.done + this.units;
  }

  /** Throws EngineStopped when asked to stop. */
  tick(units: number): void {
    this.units += units;
    if (this.units >= UNITS_PER_LOOK) this.look();
  }

  look(): void {
    this.done += this.units;
    this.units = 0;
    if (this.control.shouldStop()) throw new EngineStopped('The computation was stopped.');
    this.control.onProgress(this.pairsDone);
  }
}
