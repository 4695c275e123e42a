import { computed, ref, type ComputedRef } from 'vue';
import { axisName, toneClass, type PlotData } from './plot-model';
import { abscissas, readingsAt, readingText } from './plot-table';
import type { PlotScales } from './scales';

/** A line that people move along a plot with the arrow keys or the pointer; it stands only where data stand. */
export function useCrosshair(data: ComputedRef<PlotData>, scales: ComputedRef<PlotScales>) {
  const xs = computed(() => abscissas(data.value));
  const at = ref<number>();
  const x = computed(() => (at.value === undefined ? undefined : xs.value[Math.min(at.value, xs.value.length - 1)]));
  const readings = computed(() =>
    x.value === undefined
      ? []
      : readingsAt(data.value, x.value, scales.value.x).map(({ label, tone, value }) => ({
          label,
          tone: toneClass[tone],
          text: readingText(value),
        })),
  );
  const spoken = computed(() =>
    x.value === undefined
      ? ''
      : [
          `${axisName(data.value.x)} ${readingText(x.value)}`,
          ...readings.value.map((r) => `${r.label} ${r.text}`),
        ].join(', '),
  );

  function point(pixel: number) {
    const distances = xs.value.map((value) => Math.abs(scales.value.x(value) - pixel));
    at.value = distances.length === 0 ? undefined : distances.indexOf(Math.min(...distances));
  }

  function onKeydown(event: KeyboardEvent) {
    const last = xs.value.length - 1;
    const step = event.shiftKey ? 10 : 1;
    const moves: Record<string, () => number | undefined> = {
      ArrowRight: () => Math.min(last, (at.value ?? -1) + step),
      ArrowLeft: () => Math.max(0, (at.value ?? last + 1) - step),
      Home: () => 0,
      End: () => last,
      Escape: () => undefined,
    };
    const move = moves[event.key];
    if (!move || last < 0) return;
    event.preventDefault();
    at.value = move();
  }

  const clear = () => (at.value = undefined);
  return { x, readings, spoken, point, onKeydown, clear };
}
