import type { Pair } from '../graphs/swapMatrix';

/** Every drawing is made on an element and returns how it is changed and taken away. */
export interface Drawing<Scene> {
  /** Draws the scene; cheap where nothing that shows has changed. */
  readonly update: (scene: Scene) => void;
  /** Moves the cursor that all drawings share. Never redraws the base. */
  readonly point: (pair: Pair | null) => void;
  readonly destroy: () => void;
}

/** What a drawing tells its owner. */
export interface PairEvents {
  /** The cursor is on a pair, or on none. `spoken` if the keyboard moved it. */
  readonly onPoint: (pair: Pair | null, spoken: boolean) => void;
  /** A pair was chosen, or the choice was cleared. */
  readonly onSelect: (pair: Pair | null) => void;
}
