const people = ['engineer', 'tester', 'release', 'viewer', 'admin'];

/**
 * What the person who started the application wants to know.
 *
 * @param {{ address: string, dataFolder: string, demo: boolean, embedded: boolean }} facts
 * @returns {string}
 */
export function greeting({ address, dataFolder, demo, embedded }) {
  const password = process.env.KEEPSTEP_DEMO_PASSWORD || 'keepstep-demo-only';
  const accounts = [
    `Sign in   ${people.map((name) => `${name}@`).join(', ')} keepstep.example`,
    `Password  ${password} (unless it was changed)`,
  ];
  return [
    '',
    `Keepstep  ${address}`,
    ...(demo ? accounts : []),
    `Data      ${embedded ? dataFolder : `in the database of DATABASE_URL; the signing secret in ${dataFolder}`}`,
    'Stop      Ctrl-C',
    '',
  ].join('\n');
}
