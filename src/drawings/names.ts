import { select } from 'd3';
import type { Pair } from '../graphs/swapMatrix';
import {
  positionAt,
  positionOfEntry,
  visiblePositions,
  xAt,
  type ArrivalAxis,
  type AxisWindow,
} from './arrivalAxis';
import type { Drawing } from './drawing';
import type { Inks } from './inks';
import { namedPositions, rulerMarks, WINDOW_LANES } from './namesGeometry';
import { shortened } from './squareCells';

/** A node at its arrival. */
export interface AxisNode {
  readonly label: string;
  readonly entryRaw: string;
  readonly entry: number;
  readonly earliest: number | null;
  readonly latest: number | null;
}

export interface NamesScene {
  readonly axis: ArrivalAxis;
  /** By arrival position. */
  readonly nodes: readonly AxisNode[];
  readonly entries: Float64Array;
  readonly inks: Inks;
  readonly selection: Pair | null;
  /** Position of the node whose face is open, or null. */
  readonly node: number | null;
  readonly group: readonly number[];
}

export interface NameEvents {
  onNode(position: number): void;
  /** A stretch of arrivals was brushed, or null to see the whole axis again. */
  onWindow(window: AxisWindow): void;
}

const TICK = 6;
/** Letters of a name, and pixels for each: bold ones are the widest. */
const LETTERS = 18;
const LETTER = 6.9;
const RULER = 18;
/** A drag shorter than this (pixels) is a click. */
const DRAG = 6;

/** The axis itself: ticks, entry windows, names, and a ruler of recorded time. */
export function drawNames(element: HTMLElement, events: NameEvents): Drawing<NamesScene> {
  const svg = select(element).append('svg').attr('aria-hidden', 'true');
  const base = svg.append('g');
  const names = svg.append('g').attr('font-size', 11);
  const marks = svg.append('g').attr('fill', 'none');
  const brush = svg.append('rect').attr('opacity', 0.18).attr('y', 0);
  let scene: NamesScene | null = null;
  let cursor: Pair | null = null;
  const stopListening = listenToAxis(
    element,
    () => scene?.axis ?? null,
    events,
    (from, to) => {
      brush.attr('x', Math.min(from, to)).attr('width', Math.abs(to - from));
    },
  );

  const lanes = (next: NamesScene): number =>
    next.nodes.some((node) => node.earliest !== null || node.latest !== null)
      ? WINDOW_LANES * 4 + 4
      : 0;

  function drawBase(next: NamesScene): void {
    const { axis, inks, nodes } = next;
    const top = TICK + lanes(next);
    const longest = Math.max(3, ...nodes.map(({ label }) => Math.min(LETTERS, label.length)));
    const height = top + 16 + longest * LETTER + RULER;
    svg.attr('width', axis.width).attr('height', height).attr('font-family', inks.font);
    element.style.height = `${height}px`;
    brush.attr('height', height).attr('fill', inks.woad).attr('width', 0);
    base.selectAll('*').remove();
    const { first, last } = visiblePositions(axis);
    let ticks = `M${axis.left} 0.5H${axis.right}`;
    let windows = '';
    for (let p = first; p <= last; p += 1) {
      ticks += `M${xAt(axis, p)} 0V${axis.step < 3 ? 3 : TICK}`;
      windows += windowPath(next, p);
    }
    base
      .append('path')
      .attr('d', ticks)
      .attr('stroke', inks.ink)
      .attr('stroke-width', axis.step < 3 ? 0.6 : 1);
    base.append('path').attr('d', windows).attr('stroke', inks.edge).attr('fill', 'none');
    for (const mark of rulerMarks(
      axis,
      nodes.map((node) => node.entryRaw),
    )) {
      base
        .append('path')
        .attr('d', `M${mark.x} ${height - RULER}v14`)
        .attr('stroke', inks.edge);
      base
        .append('text')
        .attr('x', mark.x + 4)
        .attr('y', height - 5)
        .attr('font-size', 11)
        .attr('fill', inks.quiet)
        .text(mark.text);
    }
  }

  function drawNamesOf(next: NamesScene): void {
    const { axis, inks, nodes } = next;
    const ends = (pair: Pair | null): number[] => (pair === null ? [] : [pair.p, pair.q]);
    const strong = new Set([
      ...ends(next.selection),
      ...ends(cursor),
      ...(next.node === null ? [] : [next.node]),
    ]);
    const members = new Set(next.group);
    const positions = namedPositions(axis, [...strong]);
    const top = TICK + lanes(next) + 6;
    names
      .selectAll<SVGTextElement, number>('text')
      .data(positions, (p) => p)
      .join('text')
      .attr('transform', (p) => `translate(${xAt(axis, p) - 4} ${top}) rotate(90)`)
      .attr('fill', (p) => (strong.has(p) ? inks.ink : members.has(p) ? inks.woad : inks.quiet))
      .attr('font-weight', (p) => (strong.has(p) || members.has(p) ? 650 : 400))
      .text((p) => (members.has(p) ? '● ' : '') + shortened(nodes[p]?.label ?? '', LETTERS));
    marks.selectAll('*').remove();
    const stroke = (positions: Iterable<number>, colour: string, width: number): void => {
      const path = [...positions].map((p) => `M${xAt(axis, p)} 0V${TICK + 2}`).join('');
      marks.append('path').attr('d', path).attr('stroke', colour).attr('stroke-width', width);
    };
    stroke(members, inks.woad, 3);
    stroke(strong, inks.ink, 3);
    marks
      .append('path')
      .attr('d', [...strong].map((p) => windowPath(next, p)).join(''))
      .attr('stroke', inks.ink)
      .attr('stroke-width', 2);
  }

  return {
    update(next) {
      const stale =
        scene === null ||
        scene.axis !== next.axis ||
        scene.nodes !== next.nodes ||
        scene.inks !== next.inks;
      scene = next;
      if (stale) drawBase(next);
      drawNamesOf(next);
    },
    point(pair) {
      cursor = pair;
      if (scene !== null) drawNamesOf(scene);
    },
    destroy() {
      stopListening();
      svg.remove();
    },
  };
}

/** The entry window of a node as a whisker with ends, in its lane; empty without a window. */
function windowPath(scene: NamesScene, p: number): string {
  const node = scene.nodes[p];
  if (node === undefined || (node.earliest === null && node.latest === null)) return '';
  const x = (entry: number): number => xAt(scene.axis, positionOfEntry(scene.entries, entry));
  const y = TICK + 4 + (p % WINDOW_LANES) * 4;
  const from = x(node.earliest ?? node.entry);
  const to = x(node.latest ?? node.entry);
  const here = xAt(scene.axis, p);
  return `M${from} ${y - 1.5}v3M${from} ${y}H${to}M${to} ${y - 1.5}v3M${here} ${y - 1}v2`;
}

/** A click opens a node, a drag brushes a stretch, a double click shows the whole axis. */
function listenToAxis(
  element: HTMLElement,
  axis: () => ArrivalAxis | null,
  events: NameEvents,
  paint: (from: number, to: number) => void,
): () => void {
  const controller = new AbortController();
  const { signal } = controller;
  let start: number | null = null;
  const at = (event: MouseEvent): number => event.clientX - element.getBoundingClientRect().left;
  element.addEventListener(
    'pointerdown',
    (event) => (start = event.button === 0 ? at(event) : null),
    { signal },
  );
  window.addEventListener(
    'pointermove',
    (event) => {
      if (start !== null && Math.abs(at(event) - start) > DRAG) paint(start, at(event));
    },
    { signal },
  );
  window.addEventListener(
    'pointerup',
    (event) => {
      const shown = axis();
      if (start === null || shown === null) return;
      const from = positionAt(shown, Math.min(start, at(event)));
      const to = positionAt(shown, Math.max(start, at(event)));
      const clicked = Math.abs(at(event) - start) <= DRAG;
      start = null;
      paint(0, 0);
      if (!clicked) events.onWindow([from, to]);
      else events.onNode(Math.min(shown.nodeCount - 1, Math.max(0, Math.round((from + to) / 2))));
    },
    { signal },
  );
  window.addEventListener(
    'pointercancel',
    () => {
      start = null;
      paint(0, 0);
    },
    { signal },
  );
  element.addEventListener('dblclick', () => events.onWindow(null), { signal });
  return () => controller.abort();
}
