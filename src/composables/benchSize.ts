import { onBeforeUnmount, onMounted, ref, type Ref } from 'vue';

/** Width of an element in whole CSS pixels, and height of the window; both follow changes. */
export function useBenchSize(element: Readonly<Ref<HTMLElement | null>>): {
  width: Ref<number>;
  windowHeight: Ref<number>;
} {
  const width = ref(0);
  const windowHeight = ref(window.innerHeight);
  const observer = new ResizeObserver(([entry]) => {
    if (entry !== undefined) width.value = Math.floor(entry.contentRect.width);
  });
  const measure = (): void => {
    windowHeight.value = window.innerHeight;
  };
  onMounted(() => {
    if (element.value === null) return;
    width.value = Math.floor(element.value.getBoundingClientRect().width);
    observer.observe(element.value);
    window.addEventListener('resize', measure);
  });
  onBeforeUnmount(() => {
    observer.disconnect();
    window.removeEventListener('resize', measure);
  });
  return { width, windowHeight };
}
