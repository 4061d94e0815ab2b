import { select } from 'd3';
import type { MeasureField } from '../graphs/measures';
import { pairIndex, type Pair } from '../graphs/swapMatrix';
import { canvasLayer } from './canvasLayer';
import { paintCells } from './cellColours';
import type { Drawing, PairEvents } from './drawing';
import type { Inks } from './inks';
import { listenToPairs } from './pairSurface';
import { pairTip } from './pairTip';
import { paintSquare } from './squareCells';
import {
  squareCellAt,
  squareCells,
  squareGeometry,
  squarePair,
  type SquareGeometry,
} from './squareGeometry';

export interface SquareScene {
  readonly width: number;
  readonly height: number;
  /** Arrival position of each row and column. */
  readonly order: Uint32Array;
  /** Measures above and below the diagonal. */
  readonly upper: MeasureField;
  readonly lower: MeasureField;
  readonly labels: readonly string[];
  readonly inks: Inks;
  readonly selection: Pair | null;
  readonly group: readonly number[];
  readonly describe: (pair: Pair) => readonly string[];
}

/** The swap matrix as rows × columns in a chosen order, a measure in each half. */
export function drawSquare(element: HTMLElement, events: PairEvents): Drawing<SquareScene> {
  const layer = canvasLayer(element);
  const svg = select(element).append('svg').attr('aria-hidden', 'true').attr('class', 'pencil');
  const group = svg.append('path').attr('fill', 'none');
  const chosen = svg.append('path').attr('fill', 'none');
  const hover = svg.append('path').attr('fill', 'none');
  const tip = pairTip(element);
  let scene: SquareScene | null = null;
  let square: SquareGeometry | null = null;
  let cursor: Pair | null = null;

  const stopListening = listenToPairs(
    element,
    {
      locate(x, y) {
        const cell = square && squareCellAt(square, x, y);
        return square && cell ? squarePair(square, cell.row, cell.column) : null;
      },
      nodeCount: () => scene?.order.length ?? 0,
      current: () => cursor ?? scene?.selection ?? null,
    },
    events,
  );

  function repaint(next: SquareScene, geometry: SquareGeometry): void {
    const context = layer.begin(next.width, next.height);
    const paints = {
      upper: paintCells(next.upper, next.inks.dark),
      lower: next.lower === next.upper ? null : paintCells(next.lower, next.inks.dark),
    };
    const n = next.order.length;
    paintSquare(context, geometry, next, (row, column) => {
      const pair = squarePair(geometry, row, column);
      if (pair === null) return null;
      const paint = row < column ? paints.upper : (paints.lower ?? paints.upper);
      return { paint, kind: paint.classes[pairIndex(n, pair.p, pair.q)] ?? -1 };
    });
  }

  function point(pair: Pair | null): void {
    cursor = pair;
    hover.attr('display', pair === null ? 'none' : null);
    if (pair === null || square === null || scene === null) return tip.hide();
    hover.attr('d', cellsPath(square, pair, true));
    const [[row, column] = [0, 0]] = squareCells(square, pair);
    tip.show(
      scene.describe(pair),
      square.left + (column + 0.5) * square.cell,
      square.top + row * square.cell,
      scene.width,
    );
  }

  return {
    update(next) {
      const stale =
        scene === null ||
        square === null ||
        (['width', 'height', 'order', 'upper', 'lower', 'inks', 'labels'] as const).some(
          (key) => scene?.[key] !== next[key],
        );
      scene = next;
      if (square === null || stale) {
        square = squareGeometry(next.order, next.width, next.height);
        element.style.height = `${next.height}px`;
        svg.attr('width', next.width).attr('height', next.height);
        repaint(next, square);
      }
      group
        .attr('stroke', next.inks.woad)
        .attr('stroke-width', 2)
        .attr('d', groupMarks(square, next));
      chosen.attr('stroke', next.inks.ink).attr('stroke-width', 2);
      chosen.attr('d', next.selection === null ? '' : cellsPath(square, next.selection, false));
      hover.attr('stroke', next.inks.woad).attr('stroke-width', 1.5);
      point(cursor);
    },
    point,
    destroy() {
      stopListening();
      tip.destroy();
      svg.remove();
      layer.destroy();
    },
  };
}

/** Outlines of the two cells of a pair, and with `cross` the lines that lead to their names. */
function cellsPath(square: SquareGeometry, pair: Pair, cross: boolean): string {
  const { left, top, cell } = square;
  return squareCells(square, pair)
    .map(([row, column], index) => {
      const x = left + column * cell;
      const y = top + row * cell;
      const box = `M${x - 1} ${y - 1}h${cell + 2}v${cell + 2}h${-cell - 2}Z`;
      return cross && index === 0
        ? `${box}M${left} ${y + cell / 2}H${x - 1}M${x + cell / 2} ${top}V${y - 1}`
        : box;
    })
    .join('');
}

/** Short bars along the top and left edge at every member. */
function groupMarks(square: SquareGeometry, scene: SquareScene): string {
  return scene.group
    .map((position) => {
      const at = (square.place[position] ?? 0) * square.cell;
      return (
        `M${square.left + at} ${square.top - 3}h${square.cell}` +
        `M${square.left - 3} ${square.top + at}v${square.cell}`
      );
    })
    .join('');
}
