import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { rgb } from 'd3';
import { describe, expect, it } from 'vitest';

const CSS = readFileSync(join(import.meta.dirname, '../../src/css/tokens.css'), 'utf8');

/** Colours of one theme by token name. */
function coloursOf(theme: 'light' | 'dark'): Map<string, string> {
  const block = CSS.split(`:root[data-theme='${theme}'] {`)[1]?.split('}')[0] ?? '';
  return new Map(
    [...block.matchAll(/(--[\w-]+):\s*(#[0-9a-f]{6})/g)].map((m) => [m[1] ?? '', m[2] ?? '']),
  );
}

/** Contrast ratio of two sRGB colours, 1 to 21 (WCAG 2.2, W3C 2023, "contrast ratio"). */
function contrast(one: string, other: string): number {
  const light = (colour: string): number => {
    const { r, g, b } = rgb(colour);
    const [red, green, blue] = [r, g, b].map((channel) => {
      const c = channel / 255;
      return c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4;
    });
    return 0.2126 * (red ?? 0) + 0.7152 * (green ?? 0) + 0.0722 * (blue ?? 0);
  };
  const [high, low] = [light(one), light(other)].sort((a, b) => b - a);
  return ((high ?? 0) + 0.05) / ((low ?? 0) + 0.05);
}

const GROUNDS = ['--ground', '--cloth', '--sunk'];
const INKS = ['--ink', '--ink-quiet', '--woad', '--woad-deep', '--madder', '--weld-ink', '--moss'];

describe.each(['light', 'dark'] as const)('the %s theme', (theme) => {
  const colours = coloursOf(theme);
  const colour = (token: string): string => {
    const found = colours.get(token);
    if (found === undefined) throw new Error(`${token} has no colour in the ${theme} theme.`);
    return found;
  };

  it.each(INKS.flatMap((ink) => GROUNDS.map((ground) => [ink, ground] as const)))(
    '%s on %s can be read: 4.5 to 1 or better',
    (ink, ground) => {
      expect(contrast(colour(ink), colour(ground))).toBeGreaterThanOrEqual(4.5);
    },
  );

  it('words on a filled button can be read', () => {
    expect(contrast(colour('--ink-on-woad'), colour('--woad'))).toBeGreaterThanOrEqual(4.5);
    expect(contrast(colour('--ink-on-ink'), colour('--ink'))).toBeGreaterThanOrEqual(4.5);
  });

  it('the edge of a field stands out 3 to 1 from every ground', () => {
    for (const ground of GROUNDS) {
      expect(contrast(colour('--edge'), colour(ground))).toBeGreaterThanOrEqual(3);
    }
  });

  it('words on a wash can be read', () => {
    for (const name of ['woad', 'madder', 'moss']) {
      expect(contrast(colour('--ink'), colour(`--${name}-wash`))).toBeGreaterThanOrEqual(4.5);
    }
  });
});
