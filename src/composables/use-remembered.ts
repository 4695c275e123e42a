import { ref, watch, type Ref } from 'vue';

const prefix = 'keepstep.';

/** One remembered value of this browser. Storage may be shut off: then nothing is remembered and nothing fails. */
export function remembered<T>(key: string, fallback: T): { read: () => T; write: (value: T) => void } {
  return {
    read() {
      try {
        const text = localStorage.getItem(prefix + key);
        return text === null ? fallback : (JSON.parse(text) as T);
      } catch {
        return fallback;
      }
    },
    write(value) {
      try {
        localStorage.setItem(prefix + key, JSON.stringify(value));
      } catch {
        // Private windows and full storage: the choice holds for this page.
      }
    },
  };
}

/** A ref that comes back at the next visit. */
export function useRemembered<T>(key: string, fallback: T): Ref<T> {
  const kept = remembered(key, fallback);
  const value = ref(kept.read()) as Ref<T>;
  watch(value, kept.write, { deep: true });
  return value;
}
