import { onBeforeUnmount, onMounted, shallowRef, type ShallowRef } from 'vue';
import { readInks, type Inks } from '../drawings/inks';

/** The colours of the page for the drawings; read again when the theme changes. */
export function useBenchInks(): ShallowRef<Inks> {
  const root = document.documentElement;
  const inks = shallowRef(readInks(root));
  const read = (): void => {
    inks.value = readInks(root);
  };
  const observer = new MutationObserver(read);
  const system = window.matchMedia('(prefers-color-scheme: dark)');
  onMounted(() => {
    read();
    observer.observe(root, { attributes: true, attributeFilter: ['data-theme', 'class'] });
    system.addEventListener('change', read);
  });
  onBeforeUnmount(() => {
    observer.disconnect();
    system.removeEventListener('change', read);
  });
  return inks;
}
