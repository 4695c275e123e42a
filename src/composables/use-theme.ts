import { Dark } from 'quasar';
import { watchEffect, type Ref } from 'vue';
import { useRemembered } from './use-remembered';

export type Theme = 'auto' | 'light' | 'dark';

let choice: Ref<Theme> | undefined;

/** Light, dark, or as the system says: one choice for Quasar's Dark plugin and for our own tokens. */
export function useTheme(): { choice: Ref<Theme>; choose: (theme: Theme) => void } {
  choice ??= followed(useRemembered<Theme>('theme', 'auto'));
  const chosen = choice;
  return { choice: chosen, choose: (theme) => (chosen.value = theme) };
}

function followed(theme: Ref<Theme>): Ref<Theme> {
  watchEffect(() => {
    Dark.set(theme.value === 'auto' ? 'auto' : theme.value === 'dark');
    if (theme.value === 'auto') delete document.documentElement.dataset.theme;
    else document.documentElement.dataset.theme = theme.value;
  });
  return theme;
}
