import { onBeforeUnmount, onMounted, ref, type Ref } from 'vue';

/** Width of an element in CSS pixels, followed while it lives: a drawing is never scaled, its text stays 11 px. */
export function useWidth(element: Ref<HTMLElement | null>, first = 300): Ref<number> {
  const width = ref(first);
  let observer: ResizeObserver | undefined;
  onMounted(() => {
    if (!element.value) return;
    const measure = (measured: number) => measured > 0 && (width.value = Math.round(measured));
    measure(element.value.clientWidth);
    observer = new ResizeObserver(([entry]) => entry && measure(entry.contentRect.width));
    observer.observe(element.value);
  });
  onBeforeUnmount(() => observer?.disconnect());
  return width;
}
