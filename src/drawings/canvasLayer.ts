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

/** The weave of cells where nothing changes: two threads of a tile crossing at the slope of the cloth. */
export function weavePattern(
  context: CanvasRenderingContext2D,
  ground: string,
  thread: string,
): CanvasPattern | string {
  const size = 12;
  const tile = document.createElement('canvas');
  tile.width = size;
  tile.height = size;
  const pen = tile.getContext('2d');
  if (pen === null) return ground;
  pen.fillStyle = ground;
  pen.fillRect(0, 0, size, size);
  pen.strokeStyle = thread;
  pen.lineWidth = 1;
  pen.beginPath();
  for (let i = -size; i < 2 * size; i += 4) {
    pen.moveTo(i, 0);
    pen.lineTo(i + size, size);
  }
  pen.stroke();
  return context.createPattern(tile, 'repeat') ?? ground;
}
