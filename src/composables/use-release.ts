import { computed, shallowRef } from 'vue';
import { getRelease, type TaggedRelease } from '../api/releases';
import { useAction } from './use-action';

/** One release and the changes of it. A change that somebody else overtook is refused; the page then shows theirs. */
export function useRelease(id: number) {
  const { busy, error, run } = useAction();
  const tagged = shallowRef<TaggedRelease>();
  const overtaken = computed(() => error.value?.status === 409 || error.value?.status === 412);

  const load = () =>
    run(async () => {
      tagged.value = await getRelease(id);
    });

  /** @returns whether the server took the change */
  async function change(work: (release: TaggedRelease) => Promise<unknown>): Promise<boolean> {
    const release = tagged.value;
    if (!release) return false;
    const taken = await run(async () => {
      await work(release);
      return true;
    });
    if (taken || overtaken.value) await readAgain();
    return taken === true;
  }

  // Outside `run`, which would take the refusal off the page.
  async function readAgain(): Promise<void> {
    tagged.value = await getRelease(id).catch(() => tagged.value);
  }

  return { release: computed(() => tagged.value?.body), busy, error, overtaken, load, change };
}
