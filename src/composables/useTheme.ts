import { readonly, ref } from 'vue';

export type Theme = 'light' | 'dark';

/** Key of localStorage; public/theme.js reads the same before the first paint. */
const KEY = 'heddle.theme';

const system = window.matchMedia('(prefers-color-scheme: dark)');

function stored(): Theme | null {
  try {
    const value = localStorage.getItem(KEY);
    return value === 'light' || value === 'dark' ? value : null;
  } catch {
    // Storage may be closed to this page; the theme then follows the system.
    return null;
  }
}

const wanted = (): Theme => stored() ?? (system.matches ? 'dark' : 'light');

const theme = ref<Theme>(wanted());

function show(next: Theme): void {
  theme.value = next;
  document.documentElement.dataset['theme'] = next;
}

system.addEventListener('change', () => show(wanted()));
show(theme.value);

/** The theme: the system's until one is chosen, then the chosen one on this machine. */
export function useTheme() {
  function choose(next: Theme): void {
    try {
      localStorage.setItem(KEY, next);
    } catch {
      // Kept for this page only.
    }
    show(next);
  }
  return { theme: readonly(theme), choose };
}
