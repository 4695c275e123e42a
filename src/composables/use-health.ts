import { shallowRef, type ShallowRef } from 'vue';
import { getHealth, type Health } from '../api/session';

let health: ShallowRef<Health | undefined> | undefined;

/** What the server says of itself, asked once; undefined until it has answered. */
export function useHealth(): ShallowRef<Health | undefined> {
  if (health) return health;
  const asked = (health = shallowRef<Health>());
  getHealth().then(
    (answer) => (asked.value = answer),
    // The foot line goes without a number; whoever asks for data hears that the server is silent.
    () => (health = undefined),
  );
  return asked;
}
