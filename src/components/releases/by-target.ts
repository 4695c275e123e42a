import rcompare from 'semver/functions/rcompare';
import type { ReleaseSummary } from '../../api/releases';

export interface TargetReleases {
  slug: string;
  name: string;
  releases: ReleaseSummary[];
}

/** Releases of each target, the highest version first; the targets by name. */
export function releasesByTarget(releases: readonly ReleaseSummary[]): TargetReleases[] {
  const groups = new Map<string, TargetReleases>();
  for (const release of releases) {
    const { slug, name } = release.target;
    const group = groups.get(slug) ?? { slug, name, releases: [] };
    group.releases.push(release);
    groups.set(slug, group);
  }
  for (const group of groups.values()) group.releases.sort((a, b) => rcompare(a.version, b.version));
  return [...groups.values()].sort((a, b) => a.name.localeCompare(b.name));
}
