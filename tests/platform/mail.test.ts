import { mkdtemp, readFile, readdir, rm, stat } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { SMTPServer } from 'smtp-server';
import { afterEach, beforeEach, expect, test } from 'vitest';
import { startMailer } from '../../src/lib/mail.ts';

let dataDir: string;
beforeEach(async () => {
  dataDir = await mkdtemp(join(tmpdir(), 'slackwater-mail-'));
});
afterEach(() => rm(dataDir, { recursive: true }));

const mailFrom = 'Desk <desk@example.org>';

test('without a mail server messages become files only their owner can read', async () => {
  const mailer = await startMailer({ smtpUrl: null, mailFrom, dataDir });
  await mailer.send({ to: 'reader@example.org', subject: 'Hello', text: 'Open the door.' });
  await mailer.send({ to: 'b@example.org', subject: 'Zwei', text: 'b', html: '<p>b</p>' });
  await mailer.close();
  const files = (await readdir(join(dataDir, 'mail'))).sort();
  expect(files).toHaveLength(2);
  const first = join(dataDir, 'mail', files[0]!);
  expect(files[0]).toMatch(/\.eml$/);
  const content = await readFile(first, 'utf8');
  expect(content).toContain('To: reader@example.org');
  expect(content).toContain(`From: ${mailFrom}`);
  expect(content).toContain('Subject: Hello');
  expect(content).toContain('Open the door.');
  expect((await stat(first)).mode & 0o777).toBe(0o600);
});

test('with a mail server messages go there, and a refusal does not repeat the address', async () => {
  const received: string[] = [];
  const server = new SMTPServer({
    disabledCommands: ['AUTH', 'STARTTLS'],
    onRcptTo(address, _session, done) {
      if (address.address.startsWith('gone')) return done(new Error('gone@example.org unknown'));
      received.push(address.address);
      done();
    },
    onData(stream, _session, done) {
      stream.resume().on('end', () => done());
    },
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const address = server.server.address();
  const port = typeof address === 'object' ? address?.port : 0;
  const mailer = await startMailer({ smtpUrl: `smtp://127.0.0.1:${port}`, mailFrom, dataDir });
  await mailer.send({ to: 'a@example.org', subject: 's', text: 't' });
  expect(received).toEqual(['a@example.org']);
  const refusal = await mailer
    .send({ to: 'gone@example.org', subject: 's', text: 't' })
    .catch((error: Error) => error.message);
  expect(refusal).toBe('The mail server did not take the message (EENVELOPE)');
  await mailer.close();
  await new Promise<void>((resolve) => server.close(() => resolve()));
  expect(await readdir(dataDir)).toEqual([]);
});
