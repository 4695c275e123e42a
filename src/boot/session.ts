import { defineBoot } from '#q-app/wrappers';
import { useTheme } from '../composables/use-theme';
import { useSession } from '../stores/session';

/** Before the first page: the theme, so that nothing flashes, and the session, so that a reload keeps it. */
export default defineBoot(async () => {
  useTheme();
  await useSession().restore();
});
