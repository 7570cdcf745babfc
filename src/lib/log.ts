import { renameSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { destination, pino, type Logger } from 'pino';
import type { Env } from './env.ts';

export type { Logger };

/** Fields that name a person or open a door; they are taken out wherever a line has them. */
const PERSONAL = [
  'email',
  'to',
  'name',
  'ip',
  'clientAddress',
  'password',
  'token',
  'key',
  'secret',
  'cookie',
  'authorization',
  // PostgreSQL repeats values of a row in an error's detail.
  'detail',
  'parameters',
];

const KEPT_BYTES = 10 * 1024 * 1024;

/**
 * The process's log, one JSON object a line: in production to stderr for the service manager, in the
 * demo to `<data dir>/slackwater.log`, so that the terminal stays in words. Lines hold no personal data.
 */
export function openLog(env: Pick<Env, 'mode' | 'dataDir'>): Logger {
  const file = join(env.dataDir, 'slackwater.log');
  const target =
    env.mode === 'production'
      ? destination({ fd: 2, sync: true })
      : destination({ dest: rotated(file), mode: 0o600, sync: true });
  return pino(
    {
      base: { pid: process.pid },
      timestamp: pino.stdTimeFunctions.isoTime,
      redact: { paths: PERSONAL.flatMap((name) => [name, `*.${name}`]), remove: true },
    },
    target,
  );
}

/** Puts a log that has grown aside, keeping one older. */
function rotated(file: string): string {
  const size = statSync(file, { throwIfNoEntry: false })?.size ?? 0;
  if (size > KEPT_BYTES) renameSync(file, `${file}.1`);
  return file;
}
