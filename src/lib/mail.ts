import { randomBytes } from 'node:crypto';
import { mkdir, rename, writeFile } from 'node:fs/promises';
import type { AddressInfo } from 'node:net';
import { join } from 'node:path';
import { buffer } from 'node:stream/consumers';
import { createTransport, type Transporter } from 'nodemailer';
import { SMTPServer } from 'smtp-server';
import type { Env } from './env.ts';

export interface Message {
  /** One mail address. It appears in no log. */
  to: string;
  subject: string;
  text: string;
  html?: string;
}

export interface Mailer {
  /** Resolves when the mail server has taken the message; rejects without naming the address. */
  send(message: Message): Promise<void>;
  close(): Promise<void>;
}

/** Sends over SMTP where it is configured, else to a local catch-all that keeps messages as files. */
export async function startMailer(
  env: Pick<Env, 'smtpUrl' | 'mailFrom' | 'dataDir'>,
): Promise<Mailer> {
  if (env.smtpUrl) {
    return mailer(createTransport({ ...hardened, url: env.smtpUrl, pool: true }), env.mailFrom);
  }
  const catchAll = await startCatchAll(join(env.dataDir, 'mail'));
  const transport = createTransport({
    ...hardened,
    host: '127.0.0.1',
    port: catchAll.port,
    ignoreTLS: true,
  });
  return mailer(transport, env.mailFrom, catchAll.close);
}

/** Content of a message is text, never a path or an address to be read from. */
const hardened = { disableFileAccess: true, disableUrlAccess: true };

function mailer(transport: Transporter, from: string, after = async () => {}): Mailer {
  return {
    async send(message) {
      try {
        await transport.sendMail({ from, ...message });
      } catch (error) {
        // A mail server's own words repeat the address; its code does not.
        const code = error instanceof Error && 'code' in error ? String(error.code) : 'no code';
        throw new Error(`The mail server did not take the message (${code})`);
      }
    },
    async close() {
      transport.close();
      await after();
    },
  };
}

/**
 * A mail server on a free loopback port that delivers nowhere: each message becomes
 * `<directory>/<time>-<random>.eml`, complete when it appears.
 */
async function startCatchAll(
  directory: string,
): Promise<{ port: number; close: () => Promise<void> }> {
  await mkdir(directory, { recursive: true, mode: 0o700 });
  const server = new SMTPServer({
    disabledCommands: ['AUTH', 'STARTTLS'],
    disableReverseLookup: true,
    onData(stream, _session, done) {
      buffer(stream)
        .then((content) => keep(directory, content))
        .then(
          () => done(),
          () => done(new Error('The message could not be kept')),
        );
    },
  });
  // A client that breaks off must not end the process.
  server.on('error', () => {});
  await new Promise<void>((resolve, reject) => {
    server.server.once('error', reject);
    server.listen(0, '127.0.0.1', resolve);
  });
  return {
    port: (server.server.address() as AddressInfo).port,
    close: () => new Promise((resolve) => server.close(() => resolve())),
  };
}

async function keep(directory: string, content: Buffer): Promise<void> {
  const time = new Date().toISOString().replace(/[:.]/g, '-');
  const path = join(directory, `${time}-${randomBytes(4).toString('hex')}.eml`);
  await writeFile(`${path}.part`, content, { mode: 0o600 });
  await rename(`${path}.part`, path);
}
