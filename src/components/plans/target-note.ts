import type { TargetSummary } from '../../api/targets';
import { releaseStateText } from '../releases/release-words';

/** What a target is at in a few words: “map 6 · 2.4.0 in review”. */
export function targetNote(target: TargetSummary | undefined): string {
  if (!target) return '';
  const newest = target.newestRelease;
  return [`map ${target.mapNumber}`, ...(newest ? [`${newest.version} ${releaseStateText(newest.state)}`] : [])].join(
    ' · ',
  );
}
