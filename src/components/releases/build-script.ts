import { releaseFilePath, type FileEntry, type ReleaseSummary } from '../../api/releases';

/**
 * Shell lines that fetch a frozen release and check it: the manifest against the digest written here, every other file
 * against the manifest. They stop at the first difference.
 *
 * @param root address of the API, without a slash at its end
 */
export function buildScript(root: string, release: ReleaseSummary, manifest: FileEntry): string {
  const folder = root + releaseFilePath(release, '').replace(/\/$/, '');
  return [
    'set -eu',
    `files=${folder}`,
    'get() { curl --fail --silent --show-error --remote-name --header "Authorization: Bearer $KEEPSTEP_TOKEN" "$files/$1"; }',
    `get ${manifest.name}`,
    `echo "${manifest.sha256}  ${manifest.name}" | sha256sum --check`,
    `jq -r '.files[] | "\\(.sha256)  \\(.name)"' ${manifest.name} > files.sha256`,
    'while read -r _ name; do get "$name"; done < files.sha256',
    'sha256sum --check files.sha256',
  ].join('\n');
}
