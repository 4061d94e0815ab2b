/** A canvas that fills its element at the resolution of the screen. */
export interface CanvasLayer {
  readonly canvas: HTMLCanvasElement;
  /** Sizes and clears the canvas and returns its context, scaled so that 1 unit is a CSS pixel. */
  begin(width: number, height: number): CanvasRenderingContext2D;
  destroy(): void;
}

export function canvasLayer(element: HTMLElement): CanvasLayer {
  const canvas = document.createElement('canvas');
  canvas.setAttribute('aria-hidden', 'true');
  canvas.style.display = 'block';
  element.append(canvas);
  return {
    canvas,
    begin(width, height) {
      const ratio = window.devicePixelRatio || 1;
      canvas.width = Math.round(width * ratio);
      canvas.height = Math.round(height * ratio);
      canvas.style.width = `${width}px`;
      canvas.style.height = `${height}px`;
      const context = canvas.getContext('2d');
      if (context === null) throw new Error('This browser gives no canvas to draw on.');
      context.setTransform(ratio, 0, 0, ratio, 0, 0);
      context.clearRect(0, 0, width, height);
      return context;
    },
    destroy: () => canvas.remove(),
  };
}

/** Pixels of one repeat of the weave: four threads. */
const REPEAT = 12;

/** The weave of cells where nothing changes: threads in two directions, each under every other one. */
export function weavePattern(
  context: CanvasRenderingContext2D,
  ground: string,
  thread: string,
): CanvasPattern | string {
  const tile = document.createElement('canvas');
  tile.width = REPEAT;
  tile.height = REPEAT;
  const pen = tile.getContext('2d');
  if (pen === null) return ground;
  pen.fillStyle = ground;
  pen.fillRect(0, 0, REPEAT, REPEAT);
  pen.strokeStyle = thread;
  pen.lineWidth = 1.4;
  pen.lineCap = 'butt';
  pen.beginPath();
  const half = REPEAT / 2;
  for (const [x, y] of [
    [0, 0],
    [half, half],
  ] as const) {
    pen.moveTo(x + 1, y + 1);
    pen.lineTo(x + half - 1, y + half - 1);
    pen.moveTo(x + half - 1, ((y + half) % REPEAT) + 1);
    pen.lineTo(x + 1, ((y + half) % REPEAT) + half - 1);
  }
  pen.stroke();
  return context.createPattern(tile, 'repeat') ?? ground;
}
