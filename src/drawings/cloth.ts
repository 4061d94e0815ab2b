import type { MeasureField } from '../graphs/measures';
import type { Pair } from '../graphs/swapMatrix';
import type { ArrivalAxis } from './arrivalAxis';
import { canvasLayer } from './canvasLayer';
import { paintCells } from './cellColours';
import { paintCloth } from './clothCells';
import { cellCentre, clothGeometry, pairAtPoint, type ClothGeometry } from './clothGeometry';
import { clothPencil } from './clothPencil';
import type { Drawing, PairEvents } from './drawing';
import type { Inks } from './inks';
import { listenToPairs } from './pairSurface';
import { pairTip } from './pairTip';

export interface ClothScene {
  readonly axis: ArrivalAxis;
  readonly height: number;
  readonly field: MeasureField;
  readonly inks: Inks;
  readonly selection: Pair | null;
  /** Arrival positions of the group that is shown. */
  readonly group: readonly number[];
  /** Lines of the read-out of a pair. */
  readonly describe: (pair: Pair) => readonly string[];
}

/**
 * The swap matrix as cloth: cells on a canvas that is painted only when the scene changes, selection
 * and cursor on an SVG above it.
 */
export function drawCloth(element: HTMLElement, events: PairEvents): Drawing<ClothScene> {
  const layer = canvasLayer(element);
  const pencil = clothPencil(element);
  const tip = pairTip(element);
  let scene: ClothScene | null = null;
  let cloth: ClothGeometry | null = null;
  let cursor: Pair | null = null;

  const stopListening = listenToPairs(
    element,
    {
      locate: (x, y) => (cloth === null ? null : pairAtPoint(cloth, x, y)),
      nodeCount: () => scene?.axis.nodeCount ?? 0,
      current: () => cursor ?? scene?.selection ?? null,
    },
    events,
  );

  function repaint(next: ClothScene, geometry: ClothGeometry): void {
    const context = layer.begin(next.axis.width, next.height);
    paintCloth(context, geometry, paintCells(next.field, next.inks.dark), next.inks);
  }

  function point(pair: Pair | null): void {
    cursor = pair;
    pencil.point(pair);
    if (pair === null || cloth === null || scene === null) tip.hide();
    else {
      const { x, y } = cellCentre(cloth, pair);
      tip.show(scene.describe(pair), x, y, scene.axis.width);
    }
  }

  return {
    update(next) {
      const stale =
        scene === null ||
        scene.axis !== next.axis ||
        scene.height !== next.height ||
        scene.field !== next.field ||
        scene.inks !== next.inks;
      scene = next;
      if (cloth === null || stale) {
        cloth = clothGeometry(next.axis, next.height);
        element.style.height = `${next.height}px`;
        repaint(next, cloth);
      }
      pencil.update(cloth, next.inks, next.selection, next.group);
      point(cursor);
    },
    point,
    destroy() {
      stopListening();
      tip.destroy();
      pencil.destroy();
      layer.destroy();
    },
  };
}
