import { Notify } from 'quasar';
import { ref, shallowRef, type Ref, type ShallowRef } from 'vue';
import { ApiError } from '../api/client';

export interface Action {
  busy: Ref<boolean>;
  /** The last refusal, until the next run. */
  error: ShallowRef<ApiError | null>;
  /**
   * Runs one piece of work and keeps its refusal for the page. Anything that is not a refusal is a defect and thrown on.
   *
   * @param done said once the work is through, when the page itself does not show it
   * @returns what the work returned, undefined when it was refused or called off
   */
  run: <T>(work: () => Promise<T>, done?: string) => Promise<T | undefined>;
}

export function useAction(): Action {
  const running = ref(0);
  const busy = ref(false);
  const error = shallowRef<ApiError | null>(null);

  async function run<T>(work: () => Promise<T>, done?: string): Promise<T | undefined> {
    busy.value = ++running.value > 0;
    error.value = null;
    try {
      const result = await work();
      if (done) announce(done);
      return result;
    } catch (caught) {
      return answered(caught, error);
    } finally {
      busy.value = --running.value > 0;
    }
  }

  return { busy, error, run };
}

function answered(caught: unknown, error: ShallowRef<ApiError | null>): undefined {
  if (caught instanceof ApiError) error.value = caught;
  else if (!(caught instanceof DOMException && caught.name === 'AbortError')) throw caught;
}

/** A short notice at the foot of the page, in the colours of the sheet. */
export function announce(message: string): void {
  Notify.create({ message, position: 'bottom', timeout: 4000, classes: 'notice', attrs: { role: 'status' } });
}
