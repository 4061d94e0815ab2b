import type { Pair } from '../graphs/swapMatrix';
import { pairAt } from '../graphs/swapMatrix';
import { arcAtPoint, type ChosenArcs } from './arcsGeometry';
import { canvasLayer } from './canvasLayer';
import { paintCells } from './cellColours';
import type { ClothScene } from './cloth';
import { arcPath, cellCentre, clothGeometry, type ClothGeometry } from './clothGeometry';
import { clothPencil } from './clothPencil';
import type { Drawing, PairEvents } from './drawing';
import { listenToPairs } from './pairSurface';
import { pairTip } from './pairTip';

export interface ArcsScene extends ClothScene {
  readonly arcs: ChosenArcs;
}

/** A click farther from every arc than this (pixels) chooses none. */
const REACH = 12;

/** Chosen pairs as half-ellipses over the axis: the same geometry as the cloth, a dot at each apex. */
export function drawArcs(element: HTMLElement, events: PairEvents): Drawing<ArcsScene> {
  const layer = canvasLayer(element);
  const pencil = clothPencil(element);
  const tip = pairTip(element);
  let scene: ArcsScene | null = null;
  let cloth: ClothGeometry | null = null;
  let cursor: Pair | null = null;

  const stopListening = listenToPairs(
    element,
    {
      locate: (x, y) =>
        cloth === null || scene === null ? null : arcAtPoint(cloth, scene.arcs, x, y, REACH),
      nodeCount: () => scene?.axis.nodeCount ?? 0,
      current: () => cursor ?? scene?.selection ?? null,
    },
    events,
  );

  function repaint(next: ArcsScene, geometry: ClothGeometry): void {
    const context = layer.begin(next.axis.width, next.height);
    const paint = paintCells(next.field, next.inks.dark);
    const many = next.arcs.indices.length;
    context.globalAlpha = many > 1500 ? 0.35 : many > 300 ? 0.6 : 0.9;
    context.lineWidth = many > 300 ? 0.9 : 1.4;
    for (const index of next.arcs.indices) {
      const pair = pairAt(next.axis.nodeCount, index);
      const kind = paint.classes[index] ?? 0;
      const colour = kind > 0 ? (paint.colours[kind - 1] ?? next.inks.edge) : next.inks.moss;
      const { x, y } = cellCentre(geometry, pair);
      context.strokeStyle = colour;
      context.fillStyle = colour;
      context.stroke(new Path2D(arcPath(geometry, pair)));
      if (many > 1500) continue;
      context.beginPath();
      context.arc(x, y, many > 300 ? 1.4 : 2.2, 0, 2 * Math.PI);
      context.fill();
    }
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
        scene.arcs !== next.arcs ||
        scene.inks !== next.inks;
      scene = next;
      if (cloth === null || stale) {
        cloth = clothGeometry(next.axis, next.height);
        element.style.height = `${next.height}px`;
        repaint(next, cloth);
      }
      // A group shows on the axis: outlines of cells would read as arcs here.
      pencil.update(cloth, next.inks, next.selection, []);
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
