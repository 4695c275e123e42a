import { computed, onScopeDispose, ref, shallowRef, watch } from 'vue';
import { search, type Hit } from '../api/search';
import { ApiError } from '../api/client';

const pause = 150;

/** Searches while typing: the answer to an older text never covers that of a newer one. */
export function useSearch() {
  const text = ref('');
  const hits = shallowRef<Hit[]>([]);
  const at = ref(0);
  const trouble = ref('');
  const asked = ref('');
  let running = new AbortController();
  let timer: ReturnType<typeof setTimeout> | undefined;

  async function ask(wanted: string) {
    running = new AbortController();
    const { signal } = running;
    try {
      hits.value = await search(wanted, signal);
      [asked.value, at.value, trouble.value] = [wanted, 0, ''];
    } catch (error) {
      if (!signal.aborted) trouble.value = error instanceof ApiError ? error.title : 'The search failed.';
    }
  }

  watch(text, (wanted) => {
    running.abort();
    clearTimeout(timer);
    timer = setTimeout(() => void ask(wanted.trim()), pause);
  });
  onScopeDispose(() => (clearTimeout(timer), running.abort()));

  const said = computed(() => {
    if (trouble.value) return trouble.value;
    if (hits.value.length > 0) return `${hits.value.length} found; Up and Down choose, Return opens`;
    return asked.value ? `Nothing is called “${asked.value}”.` : '';
  });
  const move = (step: 1 | -1) => (at.value = Math.min(hits.value.length - 1, Math.max(0, at.value + step)));
  function clear() {
    text.value = '';
    hits.value = [];
    asked.value = '';
    void ask('');
  }
  return { text, hits, at, said, clear, move };
}
