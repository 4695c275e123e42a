export const databaseName = 'keepstep';

/** The owner migrates; the application's user reads and writes rows and can do nothing else. */
export const userNames = { owner: 'keepstep_owner', app: 'keepstep' };

/** Databases that tests make, one for each test file; `_` is a wildcard in GRANT unless escaped. */
export const testDatabasePattern = 'keepstep\\_test\\_%';
