// Everything that has to be there before the program, or with the argument `test` its tests, can run. Plain Node:
// it works before any package is installed.
import { installMissing } from './support/debian-packages.mjs';
import { checkNodeVersion } from './support/node-version.mjs';
import { installNpmPackages } from './support/npm-packages.mjs';
import { runMain } from './support/refusal.mjs';
import { root } from './support/root.mjs';

const mariadb = [
  { label: 'MariaDB', program: 'mariadbd', debianPackage: 'mariadb-server-core' },
  { label: 'MariaDB', program: 'my_print_defaults', debianPackage: 'mariadb-client-core' },
];
const forTests = [
  { label: 'Chromium', program: 'chromium', debianPackage: 'chromium' },
  { label: 'C compiler', program: 'gcc', debianPackage: 'gcc' },
  { label: 'C++ compiler', program: 'g++', debianPackage: 'g++' },
];

function needs(purpose) {
  if (purpose === 'test') return [...mariadb, ...forTests];
  return process.env.DATABASE_URL ? [] : mariadb;
}

await runMain(async () => {
  checkNodeVersion(process.versions.node);
  await installMissing(needs(process.argv[2]));
  await installNpmPackages(root);
});
