import { ref, watch, type Ref } from 'vue';

export interface Progress {
  done: number;
  total: number;
}

/**
 * Estimates the time left from the pace since the page began to watch; undefined before the first step.
 *
 * @param now milliseconds, any origin
 */
export function useTimeLeft(
  progress: () => Progress | undefined,
  now: () => number = () => performance.now(),
): Ref<string | undefined> {
  const left = ref<string>();
  let first: { done: number; at: number } | undefined;

  watch(
    progress,
    (current) => {
      if (!current) return;
      first ??= { done: current.done, at: now() };
      const steps = current.done - first.done;
      left.value = steps > 0 ? leftText(((now() - first.at) / steps) * (current.total - current.done)) : undefined;
    },
    { immediate: true },
  );
  return left;
}

/** Never finer than an estimate is good for: whole seconds below a minute, then minutes, then hours. */
export function leftText(milliseconds: number): string {
  const seconds = Math.ceil(milliseconds / 1000);
  if (seconds < 60) return `about ${seconds} s left`;
  if (seconds < 5400) return `about ${Math.round(seconds / 60)} min left`;
  return `about ${Math.round(seconds / 3600)} h left`;
}
