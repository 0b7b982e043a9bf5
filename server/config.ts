import { randomBytes } from 'node:crypto';
import { resolve } from 'node:path';
import packageJson from '../package.json';
import { environment, type Environment } from './configTable';

export interface OAuthConfig {
  clientId: string;
  clientSecret: string;
  /** Where the provider is; undefined means GitHub's own addresses. */
  authorizationUrl: string | undefined;
  tokenUrl: string | undefined;
  profileUrl: string | undefined;
  emailUrl: string | undefined;
  /** The stand-in provider inside this server is used: development and tests only. */
  local: boolean;
}

export interface ObjectStoreConfig {
  /** undefined: the region's own address at the vendor. */
  endpoint: string | undefined;
  region: string;
  bucket: string;
  accessKeyId: string;
  secretAccessKey: string;
  forcePathStyle: boolean;
}

export interface MailConfig {
  smtpUrl: string;
  from: string;
}

export interface Config {
  env: 'development' | 'test' | 'production';
  host: string;
  port: number;
  publicUrl: string | undefined;
  databaseUrl: string;
  /** Absolute. uploads/ and cubes/ lie below it. */
  dataDir: string;
  sessionSecret: string;
  oauth: OAuthConfig;
  /** null: cubes are kept on disk. */
  objectStore: ObjectStoreConfig | null;
  /** null: no mail is sent. */
  mail: MailConfig | null;
  maxUploadBytes: number;
  /** A gzip or tile-compressed file is expanded up to here. */
  maxExpandedBytes: number;
  workerThreads: number;
  /** Memory that reading a cube may take in all threads of a worker together, beside what Node itself needs. */
  workerMemoryBytes: number;
  /** Cubes with more bytes of pixels than this are copied plane by plane, whatever their order. */
  copyFromBytes: number;
  logLevel: Environment['LOG_LEVEL'];
  /** Written into the provenance of every fit. */
  codeVersion: string;
  demo: boolean;
}

export interface ConfigMistake {
  variable: string;
  message: string;
}

/** The environment cannot be used. The message names every variable at fault, and no value. */
export class ConfigError extends Error {
  constructor(readonly mistakes: ConfigMistake[]) {
    const lines = mistakes.map((m) => `  ${m.variable} ${m.message}`);
    super(`The environment cannot be used:\n${lines.join('\n')}\nREADME.md lists the variables.`);
    this.name = 'ConfigError';
  }
}

/** Reads and checks the environment once; all mistakes are told together. Throws ConfigError. */
export function loadConfig(env: Record<string, string | undefined> = process.env): Config {
  const parsed = environment.safeParse(env);
  if (!parsed.success) {
    // The rules between variables are looked at only once each is right by itself.
    throw new ConfigError(
      parsed.error.issues.map((i) => ({ variable: String(i.path[0] ?? ''), message: i.message })),
    );
  }
  const e = parsed.data;
  const mistakes = [...missing(e), ...contradictions(e)];
  if (mistakes.length > 0) throw new ConfigError(mistakes);
  return deepFreeze(toConfig(e));
}

function missing(e: Environment): ConfigMistake[] {
  const mistakes: ConfigMistake[] = [];
  const want = (variable: keyof Environment, message: string) => {
    if (e[variable] === undefined) mistakes.push({ variable, message });
  };
  want('DATABASE_URL', 'is missing: the address of the PostgreSQL database');
  if (e.NODE_ENV === 'production') {
    want('PUBLIC_URL', 'is missing: production needs the address that people open');
    want('SESSION_SECRET', 'is missing: production needs at least 32 random characters');
    if (e.GITHUB_CLIENT_SECRET === undefined)
      want('GITHUB_CLIENT_ID', 'is missing: production needs a GitHub OAuth application');
  }
  for (const [first, second] of pairs(e)) want(second, `is missing: ${first} is set and needs it`);
  return mistakes;
}

/** Variables of which the second is needed once the first is set. */
function pairs(e: Environment): [keyof Environment, keyof Environment][] {
  const all: [keyof Environment, keyof Environment][] = [
    ['GITHUB_CLIENT_ID', 'GITHUB_CLIENT_SECRET'],
    ['GITHUB_CLIENT_SECRET', 'GITHUB_CLIENT_ID'],
    ['S3_BUCKET', 'S3_ACCESS_KEY_ID'],
    ['S3_BUCKET', 'S3_SECRET_ACCESS_KEY'],
    ['SMTP_URL', 'MAIL_FROM'],
    ['MAIL_FROM', 'SMTP_URL'],
  ];
  const alone = (['S3_ENDPOINT', 'S3_ACCESS_KEY_ID', 'S3_SECRET_ACCESS_KEY'] as const).find(
    (name) => e[name] !== undefined,
  );
  if (alone) all.push([alone, 'S3_BUCKET']);
  return all.filter(([first]) => e[first] !== undefined);
}

function contradictions(e: Environment): ConfigMistake[] {
  const mistakes: ConfigMistake[] = [];
  if (e.NODE_ENV === 'production' && e.OUTSWELL_DEMO)
    mistakes.push({
      variable: 'OUTSWELL_DEMO',
      message: 'must be 0 in production: the demo is invented data',
    });
  if (e.GITHUB_CLIENT_ID === undefined)
    for (const variable of [
      'GITHUB_AUTHORIZATION_URL',
      'GITHUB_TOKEN_URL',
      'GITHUB_PROFILE_URL',
      'GITHUB_EMAIL_URL',
    ] as const)
      if (e[variable] !== undefined)
        mistakes.push({ variable, message: 'is set without GITHUB_CLIENT_ID, so it would not be used' });
  return mistakes;
}

function toConfig(e: Environment): Config {
  return {
    env: e.NODE_ENV,
    host: e.HOST,
    port: e.PORT,
    publicUrl: e.PUBLIC_URL && new URL(e.PUBLIC_URL).origin,
    databaseUrl: e.DATABASE_URL!,
    dataDir: resolve(e.DATA_DIR),
    // Without a secret, outside production, everybody is signed out by a restart, and nothing is guessable.
    sessionSecret: e.SESSION_SECRET ?? randomBytes(32).toString('base64url'),
    oauth: {
      clientId: e.GITHUB_CLIENT_ID ?? 'outswell-local',
      clientSecret: e.GITHUB_CLIENT_SECRET ?? randomBytes(32).toString('base64url'),
      authorizationUrl: e.GITHUB_AUTHORIZATION_URL,
      tokenUrl: e.GITHUB_TOKEN_URL,
      profileUrl: e.GITHUB_PROFILE_URL,
      emailUrl: e.GITHUB_EMAIL_URL,
      local: e.GITHUB_CLIENT_ID === undefined,
    },
    objectStore:
      e.S3_BUCKET === undefined
        ? null
        : {
            endpoint: e.S3_ENDPOINT,
            region: e.S3_REGION,
            bucket: e.S3_BUCKET,
            accessKeyId: e.S3_ACCESS_KEY_ID!,
            secretAccessKey: e.S3_SECRET_ACCESS_KEY!,
            // Stores other than the vendor's seldom have a host name for each bucket.
            forcePathStyle: e.S3_FORCE_PATH_STYLE ?? e.S3_ENDPOINT !== undefined,
          },
    mail: e.SMTP_URL === undefined ? null : { smtpUrl: e.SMTP_URL, from: e.MAIL_FROM! },
    maxUploadBytes: e.MAX_UPLOAD_BYTES,
    maxExpandedBytes: e.MAX_EXPANDED_BYTES,
    workerThreads: e.WORKER_THREADS,
    workerMemoryBytes: e.WORKER_MEMORY_BYTES,
    copyFromBytes: e.COPY_FROM_BYTES,
    logLevel: e.LOG_LEVEL,
    codeVersion: packageJson.version + (e.OUTSWELL_COMMIT ? `+${e.OUTSWELL_COMMIT}` : ''),
    demo: e.OUTSWELL_DEMO,
  };
}

function deepFreeze<T extends object>(value: T): T {
  for (const inner of Object.values(value)) if (inner && typeof inner === 'object') deepFreeze(inner);
  return Object.freeze(value);
}
