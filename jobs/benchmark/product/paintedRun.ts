import type { Browser, Page } from '@playwright/test';
import { ACCOUNT } from './visitor';

/** Seconds from the click on the start button. */
export interface PaintedRun {
  /** First cells painted. */
  readonly first: number;
  /** No cell of the cloth is open any more. */
  readonly whole: number;
}

/** Milliseconds until a page must have done what is waited for. */
const PATIENCE = 120_000;

const ARGS = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];

export async function openBrowser(): Promise<Browser> {
  const { chromium } = await import('@playwright/test');
  return chromium.launch({ executablePath: '/usr/bin/chromium', args: ARGS });
}

/** A page with a session, in which the cloth's paints are watched. */
export async function openPage(browser: Browser, origin: string): Promise<Page> {
  const page = await browser.newPage({ viewport: { width: 1440, height: 900 } });
  page.setDefaultTimeout(PATIENCE);
  await page.addInitScript(watchPaints);
  await page.goto(`${origin}/sign-in`);
  await page.getByLabel('E-mail').fill(ACCOUNT.email);
  await page.getByLabel('Password').fill(ACCOUNT.password);
  await page.getByRole('button', { name: 'Sign in', exact: true }).click();
  await page.waitForURL((url) => url.pathname !== '/sign-in');
  return page;
}

/** Opens the page of a dataset, waits for its estimate, clicks, and waits for the whole cloth. */
export async function paintRun(page: Page, datasetPath: string): Promise<PaintedRun> {
  await page.goto(datasetPath);
  const start = page.getByRole('button', { name: 'Start the run' });
  await start.waitFor();
  await page.waitForLoadState('networkidle');
  await start.click();
  const whole = await page.waitForFunction(() => window.heddlePaints?.whole);
  const paints = await page.evaluate(() => window.heddlePaints);
  await whole.dispose();
  if (paints?.clicked === undefined || paints.first === undefined || paints.whole === undefined) {
    throw new Error('The page was not watched.');
  }
  return {
    first: (paints.first - paints.clicked) / 1000,
    whole: (paints.whole - paints.clicked) / 1000,
  };
}

interface Paints {
  clicked?: number;
  first?: number;
  whole?: number;
}

declare global {
  interface Window {
    /** Milliseconds on the page's clock. */
    heddlePaints?: Paints;
  }
}

/**
 * Runs in the page. The cloth fills the lozenges of pairs that have landed and strokes the open ones;
 * where they are too narrow it puts an image in which landed ones are opaque. What was painted counts
 * from the next frame on.
 */
function watchPaints(): void {
  const paints: Paints = (window.heddlePaints = {});
  window.addEventListener(
    'click',
    (event) => {
      const button = event.target instanceof Element ? event.target.closest('button') : null;
      if (button?.textContent.includes('Start the run')) paints.clicked = performance.now();
    },
    true,
  );
  /** Cells painted since the last frame, by canvas; null for the image of a cloth. */
  let frame: Map<HTMLCanvasElement | null, { landed: number; open: number }> | null = null;
  const note = (canvas: HTMLCanvasElement | null, landed: number, open: number): void => {
    if (paints.clicked === undefined || !location.pathname.includes('/runs/')) return;
    if (frame === null) {
      frame = new Map();
      requestAnimationFrame(() => setTimeout(settle));
    }
    const cells = frame.get(canvas) ?? { landed: 0, open: 0 };
    frame.set(canvas, { landed: cells.landed + landed, open: cells.open + open });
  };
  // The first paint may come before the canvas has its place in the page.
  const isCloth = (canvas: HTMLCanvasElement | null) =>
    canvas === null || canvas.closest('[aria-label^="Cloth of"]') !== null;
  const settle = (): void => {
    const now = performance.now();
    for (const [canvas, { landed, open }] of frame ?? []) {
      if (!isCloth(canvas) || landed === 0) continue;
      paints.first ??= now;
      if (open === 0) paints.whole ??= now;
    }
    frame = null;
  };
  const before = (name: string, look: (canvas: HTMLCanvasElement, given: unknown) => void) => {
    const original: unknown = Reflect.get(CanvasRenderingContext2D.prototype, name);
    if (typeof original !== 'function') throw new Error(`No ${name} on a canvas.`);
    const watched = function (this: CanvasRenderingContext2D, ...args: unknown[]): unknown {
      look(this.canvas, args[0]);
      return Reflect.apply(original, this, args);
    };
    Reflect.set(CanvasRenderingContext2D.prototype, name, watched);
  };
  // A canvas that is painted twice within a frame shows the second paint.
  before('clearRect', (canvas) => frame?.delete(canvas));
  before('fill', (canvas, path) => {
    if (path instanceof Path2D) note(canvas, 1, 0);
  });
  before('stroke', (canvas, path) => {
    if (path instanceof Path2D) note(canvas, 0, 1);
  });
  before('putImageData', (_canvas, image) => {
    if (!(image instanceof ImageData) || image.width !== image.height || image.width < 65) return;
    const n = image.width;
    let landed = 0;
    for (let p = 0; p < n; p++) {
      for (let q = p + 1; q < n; q++) if (image.data[4 * (p * n + q) + 3] === 255) landed++;
    }
    frame?.delete(null);
    note(null, landed, (n * (n - 1)) / 2 - landed);
  });
}
