import { onBeforeUnmount, onMounted, watch, type Ref } from 'vue';
import type { Drawing } from '../drawings/drawing';
import { useBench } from './benchContext';

/**
 * Ties the life of a drawing to a component: made on its element, updated when the scene changes,
 * told of the shared cursor, destroyed with it.
 * @param scene null while there is nothing to draw.
 */
export function useBenchDrawing<Scene>(
  element: Readonly<Ref<HTMLElement | null>>,
  make: (element: HTMLElement) => Drawing<Scene>,
  scene: () => Scene | null,
): void {
  const { pointers } = useBench();
  let drawing: Drawing<Scene> | null = null;
  const show = (next: Scene | null): void => {
    if (next !== null) drawing?.update(next);
  };
  watch(scene, show, { flush: 'post' });
  onMounted(() => {
    if (element.value === null) return;
    drawing = make(element.value);
    pointers.add(drawing.point);
    show(scene());
  });
  onBeforeUnmount(() => {
    if (drawing !== null) pointers.delete(drawing.point);
    drawing?.destroy();
  });
}
