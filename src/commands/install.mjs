import { existsSync } from 'node:fs';
import { readFile } from 'node:fs/promises';
import { join } from 'node:path';
import { CommandError, ROOT, run } from './run.mjs';

/** What comes from Debian: the file that shows it is there, and its package. */
const DEBIAN = {
  postgresql: { file: '/usr/lib/postgresql/15/bin/pg_ctl', package: 'postgresql-15' },
  chromium: { file: '/usr/bin/chromium', package: 'chromium' },
};

/** Refuses another Node than the packages run on. */
export function checkNode() {
  const [major = 0, minor = 0] = process.versions.node.split('.').map(Number);
  if (major !== 20 || minor < 19) {
    throw new CommandError(
      `Slackwater runs on Node 20, from 20.19 on, and this is Node ${process.versions.node}: install Node 20 and start again.`,
    );
  }
}

/**
 * Installs the packages of the lock file unless exactly they are installed.
 * @param {import('./progress.mjs').Progress} progress
 * @param {AbortSignal} [signal]
 */
export async function installPackages(progress, signal) {
  if (await areInstalled()) return;
  progress.step('Installing packages');
  // Tests and builds need the development packages whatever NODE_ENV says.
  const { code, output } = await run('npm', ['ci', '--include=dev', '--no-audit', '--no-fund'], {
    signal,
  });
  if (code !== 0) {
    throw new CommandError(
      'The packages could not be installed: see npm’s words above, check the network, and start again.',
      output,
    );
  }
}

/** Compares versions: the times of a clone's files say nothing, and npm writes its own list last of all. */
async function areInstalled() {
  const read = async (path) => JSON.parse(await readFile(join(ROOT, path), 'utf8')).packages;
  try {
    const wanted = await read('package-lock.json');
    const found = await read('node_modules/.package-lock.json');
    return Object.entries(wanted).every(
      // An optional package may belong to another kind of machine.
      ([path, { version, optional }]) =>
        path === '' || optional || found[path]?.version === version,
    );
  } catch {
    return false;
  }
}

/**
 * Installs what is missing of Debian's packages, as root or through sudo.
 * @param {(keyof typeof DEBIAN)[]} names
 * @param {import('./progress.mjs').Progress} progress
 * @param {AbortSignal} [signal]
 */
export async function installFromDebian(names, progress, signal) {
  const missing = names.map((name) => DEBIAN[name]).filter(({ file }) => !existsSync(file));
  if (missing.length === 0) return;
  const packages = missing.map((part) => part.package);
  const byHand = `install Debian’s ${packages.join(' and ')} as root (apt-get install ${packages.join(' ')}) and start again`;
  if (!existsSync('/usr/bin/apt-get')) {
    throw new CommandError(`${packages.join(' and ')} cannot be installed here: ${byHand}.`);
  }
  const asRoot = process.getuid?.() === 0;
  const privileged = async (command, args) => {
    const [program, ...all] = asRoot ? [command, ...args] : ['sudo', command, ...args];
    const { code, output } = await run(program, all, {
      signal,
      // sudo may ask for a password.
      stdin: asRoot ? 'ignore' : 'inherit',
    }).catch((error) => ({ code: 1, output: String(error) }));
    signal?.throwIfAborted();
    if (code !== 0) {
      throw new CommandError(
        `${packages.join(' and ')} could not be installed: ${byHand}.`,
        output,
      );
    }
  };
  const apt = (...args) =>
    privileged('env', [
      'DEBIAN_FRONTEND=noninteractive',
      'apt-get',
      '--quiet',
      // Another apt may be at work, as on a machine's first minutes.
      '--option=DPkg::Lock::Timeout=300',
      ...args,
    ]);

  progress.step(`Installing Debian’s ${packages.join(' and ')}`);
  await apt('update');
  if (packages.includes(DEBIAN.postgresql.package)) {
    await apt('install', '--yes', '--no-install-recommends', 'postgresql-common');
    // Debian would start a cluster of its own beside ours.
    const directory = '/etc/postgresql-common/createcluster.d';
    const settings = `mkdir -p ${directory} && echo 'create_main_cluster = false' > ${directory}/slackwater.conf`;
    await privileged('sh', ['-c', settings]);
  }
  await apt('install', '--yes', '--no-install-recommends', ...packages);
}
