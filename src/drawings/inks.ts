/** The colours a drawing uses, read from the tokens of the page (src/css/tokens.css). */
export interface Inks {
  readonly ground: string;
  readonly cloth: string;
  readonly ink: string;
  readonly quiet: string;
  readonly hairline: string;
  readonly edge: string;
  readonly woad: string;
  readonly madder: string;
  readonly madderWash: string;
  readonly weld: string;
  readonly moss: string;
  readonly thread: string;
  readonly font: string;
  readonly dark: boolean;
}

/** Reads the tokens as they hold at an element. Call again when the theme changes. */
export function readInks(element: Element): Inks {
  const style = getComputedStyle(element);
  const token = (name: string): string => style.getPropertyValue(name).trim();
  return {
    ground: token('--ground'),
    cloth: token('--cloth'),
    ink: token('--ink'),
    quiet: token('--ink-quiet'),
    hairline: token('--hairline-colour'),
    edge: token('--edge'),
    woad: token('--woad'),
    madder: token('--madder'),
    madderWash: token('--madder-wash'),
    weld: token('--weld'),
    moss: token('--moss'),
    thread: token('--thread'),
    font: token('--font') || 'sans-serif',
    dark: style.colorScheme === 'dark' || token('color-scheme') === 'dark',
  };
}
