/** What is wrong with the environment, in one sentence for the person who starts the server. */
export class ConfigError extends Error {
  override readonly name = 'ConfigError';
}

const logLevels = ['fatal', 'error', 'warn', 'info', 'debug', 'trace', 'silent'];

export interface Config {
  readonly host: string;
  readonly port: number;
  /** Address of the database for the application's user, who may only read and write rows. */
  readonly databaseUrl: string;
  /** Address for the owner, who migrates; absent: the application's user must migrate. */
  readonly databaseOwnerUrl: string | undefined;
  /** The database was started for this server alone, on loopback. */
  readonly embedded: boolean;
  readonly production: boolean;
  readonly dataDir: string;
  /** Signs access tokens; absent: a file in the data folder holds one. */
  readonly secret: string | undefined;
  readonly demoPassword: string;
  /** Of the first admin, made when nobody can sign in yet. */
  readonly adminEmail: string;
  /** Where browsers reach the application; one-time links begin with it. */
  readonly publicUrl: string;
  readonly logLevel: string;
}

type Environment = Readonly<Record<string, string | undefined>>;

function portOf(text: string): number {
  const port = Number(text);
  if (/^\d+$/.test(text) && port <= 65_535) return port;
  throw new ConfigError(`PORT must be a whole number from 0 to 65535, not “${text}”.`);
}

function urlOf(name: string, text: string | undefined, protocols: readonly string[]): string {
  const url = text && URL.canParse(text) ? new URL(text) : undefined;
  if (text && url && protocols.includes(url.protocol)) return text.replace(/\/$/, '');
  throw new ConfigError(`${name} must be an address that begins with ${protocols.map((p) => `${p}//`).join(' or ')}.`);
}

const databaseAddress = (name: string, text: string | undefined) => urlOf(name, text, ['mysql:', 'mariadb:']);

function secretOf(text: string | undefined): string | undefined {
  if (!text || text.length >= 32) return text || undefined;
  throw new ConfigError('KEEPSTEP_SECRET must have at least 32 characters.');
}

function logLevelOf(text: string): string {
  if (logLevels.includes(text)) return text;
  throw new ConfigError(`LOG_LEVEL must be one of ${logLevels.join(', ')}, not “${text}”.`);
}

/**
 * Reads the environment once. An empty variable counts as absent.
 *
 * @throws {ConfigError} one sentence that names the first variable at fault
 */
export function readConfig(env: Environment): Config {
  const host = env.HOST || '127.0.0.1';
  const port = portOf(env.PORT || '8080');
  return Object.freeze({
    host,
    port,
    databaseUrl: databaseAddress('DATABASE_URL', env.DATABASE_URL),
    databaseOwnerUrl: env.DATABASE_OWNER_URL
      ? databaseAddress('DATABASE_OWNER_URL', env.DATABASE_OWNER_URL)
      : undefined,
    embedded: env.KEEPSTEP_EMBEDDED === '1',
    production: env.NODE_ENV === 'production',
    dataDir: env.KEEPSTEP_DATA_DIR || 'var',
    secret: secretOf(env.KEEPSTEP_SECRET),
    demoPassword: env.KEEPSTEP_DEMO_PASSWORD || 'keepstep-demo-only',
    adminEmail: (env.KEEPSTEP_ADMIN_EMAIL || 'admin@localhost').toLowerCase(),
    publicUrl: urlOf('KEEPSTEP_PUBLIC_URL', env.KEEPSTEP_PUBLIC_URL || `http://${host}:${port}`, ['http:', 'https:']),
    logLevel: logLevelOf(env.LOG_LEVEL || 'info'),
  });
}
