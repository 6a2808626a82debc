import { readFileSync } from 'node:fs';
import path from 'node:path';
import { z } from 'zod';

const MIB = 1024 * 1024;

const environment = z.object({
  IDEM_APP_DATABASE_URL: z.url(),
  IDEM_HOST: z.string().default('127.0.0.1'),
  IDEM_PORT: z.coerce.number().int().min(0).max(65535).default(8440),
  IDEM_DATA_DIR: z.string().min(1),
  IDEM_SESSION_SECRET_FILE: z.string().optional(),
  IDEM_SESSION_SECRET: z.string().min(32).optional(),
  /** Where people reach the product; an https address makes cookies Secure. */
  IDEM_PUBLIC_URL: z.url().optional(),
  IDEM_MAX_UPLOAD_BYTES: z.coerce.number().int().positive().default(2048 * MIB),
  IDEM_MAX_UNPACKED_BYTES: z.coerce.number().int().positive().default(8192 * MIB),
  IDEM_LOG_LEVEL: z.enum(['fatal', 'error', 'warn', 'info', 'debug', 'silent']).default('info'),
  IDEM_SIGN_IN_PER_MINUTE: z.coerce.number().int().positive().default(20),
});

export interface Config {
  databaseUrl: string;
  host: string;
  port: number;
  dataDir: string;
  filesDir: string;
  clientDir: string;
  sessionSecret: Uint8Array;
  secureCookies: boolean;
  maxUploadBytes: number;
  maxUnpackedBytes: number;
  signInPerMinute: number;
  logLevel: string;
}

/** Reads the configuration of a web or worker process from IDEM_* variables; throws with the variable's name. */
export function readConfig(env: NodeJS.ProcessEnv): Config {
  const parsed = environment.safeParse(env);
  if (!parsed.success) {
    throw new Error(parsed.error.issues.map((issue) => `${issue.path.join('.')}: ${issue.message}`).join('; '));
  }
  const e = parsed.data;
  const secret =
    e.IDEM_SESSION_SECRET ??
    (e.IDEM_SESSION_SECRET_FILE === undefined ? null : readFileSync(e.IDEM_SESSION_SECRET_FILE, 'utf8').trim());
  if (secret === null || secret.length < 32) {
    throw new Error('IDEM_SESSION_SECRET_FILE: names no file with a secret of at least 32 characters');
  }
  return {
    databaseUrl: e.IDEM_APP_DATABASE_URL,
    host: e.IDEM_HOST,
    port: e.IDEM_PORT,
    dataDir: e.IDEM_DATA_DIR,
    filesDir: path.join(e.IDEM_DATA_DIR, 'files'),
    clientDir: path.join(import.meta.dirname, '..', 'dist', 'client'),
    sessionSecret: new TextEncoder().encode(secret),
    secureCookies: e.IDEM_PUBLIC_URL?.startsWith('https:') ?? false,
    maxUploadBytes: e.IDEM_MAX_UPLOAD_BYTES,
    maxUnpackedBytes: e.IDEM_MAX_UNPACKED_BYTES,
    signInPerMinute: e.IDEM_SIGN_IN_PER_MINUTE,
    logLevel: e.IDEM_LOG_LEVEL,
  };
}
