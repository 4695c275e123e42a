import inc from 'semver/functions/inc';
import rcompare from 'semver/functions/rcompare';
import valid from 'semver/functions/valid';

/** The version that most likely follows the ones a target has: the next minor one, or the release of a preview. */
export function nextVersion(versions: readonly string[]): string {
  const newest = versions.filter((version) => valid(version)).sort(rcompare)[0];
  if (newest === undefined) return '1.0.0';
  return inc(newest, newest.includes('-') ? 'patch' : 'minor') ?? '1.0.0';
}

/** What is wrong with a typed version; undefined when it can be used. */
export function versionFault(version: string, taken: readonly string[]): string | undefined {
  if (version === '') return 'A version like 2.4.0.';
  if (valid(version) !== version) return 'Three numbers with points, like 2.4.0, or a preview like 2.4.0-rc.1.';
  return taken.includes(version) ? `${version} exists for this target.` : undefined;
}
