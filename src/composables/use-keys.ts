import { onBeforeUnmount, onMounted, type Ref } from 'vue';
import { useRemembered } from './use-remembered';

export type Keys = Readonly<Record<string, () => void>>;

let single: Ref<boolean> | undefined;

/** Whether single keys act at all; people who dictate or use switches turn them off. */
export const useSingleKeys = (): Ref<boolean> => (single ??= useRemembered('single-keys', true));

/**
 * Listens while the component lives: `'/'`, `'['`, `'ctrl+s'`. Single keys act only outside fields and dialogs and while
 * they are switched on; keys with Ctrl always do.
 */
export function useKeys(keys: Keys): void {
  const allowed = useSingleKeys();
  const on = (event: KeyboardEvent) => {
    const name = nameOf(event);
    const act = keys[name];
    if (!act || event.defaultPrevented) return;
    if (!name.startsWith('ctrl+') && (!allowed.value || inField(event))) return;
    event.preventDefault();
    act();
  };
  onMounted(() => document.addEventListener('keydown', on));
  onBeforeUnmount(() => document.removeEventListener('keydown', on));
}

const nameOf = (event: KeyboardEvent): string =>
  event.altKey ? '' : (event.ctrlKey || event.metaKey ? 'ctrl+' : '') + event.key;

function inField(event: KeyboardEvent): boolean {
  const at = event.target instanceof Element ? event.target : document.body;
  return at.closest('input:not([type=radio]), textarea, select, [contenteditable], [role=dialog]') !== null;
}
