import { execFile } from 'node:child_process';
import { promisify } from 'node:util';

const PG_DUMP = '/usr/lib/postgresql/15/bin/pg_dump';

/** The schema of a database as SQL, without what differs between two dumps of the same schema. */
export async function dumpSchema(url: string): Promise<string> {
  const { stdout } = await promisify(execFile)(
    PG_DUMP,
    ['--schema-only', '--no-owner', `--dbname=${url}`],
    { maxBuffer: 64 * 1024 * 1024 },
  );
  const kept = stdout
    .split('\n')
    // Session settings, comments with the program's version, and the random marks of newer programs.
    .filter((line) => !/^(--|SET |SELECT pg_catalog\.set_config|\\(un)?restrict)/.test(line));
  return `${kept
    .join('\n')
    .replace(/\n{3,}/g, '\n\n')
    .trim()}\n`;
}
