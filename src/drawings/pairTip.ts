/** The read-out that follows the pointer: a few lines of text, never markup. */
export interface PairTip {
  show(lines: readonly string[], x: number, y: number, width: number): void;
  hide(): void;
  destroy(): void;
}

const OFFSET = 14;

export function pairTip(element: HTMLElement): PairTip {
  const tip = document.createElement('div');
  tip.className = 'pair-tip';
  tip.setAttribute('aria-hidden', 'true');
  tip.hidden = true;
  element.append(tip);
  return {
    show(lines, x, y, width) {
      tip.replaceChildren(
        ...lines.map((line) => {
          const row = document.createElement('div');
          row.textContent = line;
          return row;
        }),
      );
      tip.hidden = false;
      const beyond = x + OFFSET + tip.offsetWidth > width;
      const left = beyond ? Math.max(0, x - OFFSET - tip.offsetWidth) : x + OFFSET;
      tip.style.transform = `translate(${Math.round(left)}px, ${Math.round(Math.max(0, y - tip.offsetHeight - OFFSET))}px)`;
    },
    hide() {
      tip.hidden = true;
    },
    destroy: () => tip.remove(),
  };
}
