import { spawn } from 'node:child_process';
import { mkdtemp, readFile, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { buildWhenStale } from './build.mjs';
import { checkNode, installFromDebian, installPackages } from './install.mjs';
import { duration, Progress } from './progress.mjs';
import { CommandError, ROOT, run } from './run.mjs';

const bin = (path) => join(ROOT, 'node_modules', path);

// The product's own settings are for the product: tests never touch the demo's data or a real database.
for (const name of Object.keys(process.env)) {
  if (/^(SLACKWATER_.*|DATABASE_URL|PORT|HOST)$/.test(name)) delete process.env[name];
}
// A log that is read later is plain text.
if (!process.stdout.isTTY) process.env.NO_COLOR = '1';

// Ctrl-C reaches every program on the terminal by itself; this is for whoever ends only us.
const broken = new AbortController();
process.once('SIGTERM', () => {
  broken.abort();
  process.exitCode = 1;
});

/** @type {{ name: string, passed: boolean, ms: number }[]} */
const steps = [];

/** Does one check and says how it went; a failed one is told in full and does not stop the others. */
async function check(name, work) {
  const started = performance.now();
  let passed = true;
  let output = '';
  try {
    const result = await work();
    passed = result.code === 0;
    output = result.output;
  } catch (error) {
    passed = false;
    output = error instanceof CommandError ? error.output : '';
    output = `${output}\n${error instanceof Error ? error.message : error}`;
  }
  const ms = performance.now() - started;
  steps.push({ name, passed, ms });
  if (!passed) console.log(`\n${output.trim()}\n`);
  console.log(`${name} … ${passed ? 'passed' : 'FAILED'}, ${duration(ms)}`);
  return passed;
}

const node = (path, ...args) =>
  run(process.execPath, [bin(path), ...args], { signal: broken.signal });

const format = () => node('prettier/bin/prettier.cjs', '--check', '--log-level=warn', '.');
const lint = () => node('eslint/bin/eslint.js', '--max-warnings=0', '.');
const types = () => node('astro/astro.js', 'check', '--minimumSeverity', 'error');
const build = async () => {
  await buildWhenStale(undefined, broken.signal);
  return { code: 0, output: '' };
};

/** Runs the tests with their words on the terminal, and answers how many passed and failed. */
async function tests() {
  const directory = await mkdtemp(join(tmpdir(), 'slackwater-results-'));
  const report = join(directory, 'report.json');
  try {
    const code = await new Promise((resolve, reject) => {
      const args = ['run', '--reporter=default', '--reporter=json', `--outputFile.json=${report}`];
      const child = spawn(process.execPath, [bin('vitest/vitest.mjs'), ...args], {
        cwd: ROOT,
        signal: broken.signal,
        stdio: ['ignore', 'inherit', 'inherit'],
      });
      child.once('error', reject);
      child.once('close', (ended) => resolve(ended ?? 1));
    });
    const { passed, failed } = await totals(report);
    // A run that failed outside of any test is a failure too.
    return { code, output: '', passed, failed: code === 0 ? failed : Math.max(1, failed) };
  } finally {
    await rm(directory, { recursive: true });
  }
}

async function totals(report) {
  try {
    const found = JSON.parse(await readFile(report, 'utf8'));
    // A file that could not be loaded has no tests to count; it counts as one.
    const unread = found.testResults.filter(
      (file) =>
        file.status === 'failed' && file.assertionResults.every((t) => t.status !== 'failed'),
    );
    return { passed: found.numPassedTests, failed: found.numFailedTests + unread.length };
  } catch {
    return { passed: 0, failed: 1 };
  }
}

/** Sets up what the checks need. */
async function setUp() {
  const progress = new Progress();
  try {
    checkNode();
    await installPackages(progress, broken.signal);
    await installFromDebian(['postgresql', 'chromium'], progress, broken.signal);
    progress.done();
  } catch (error) {
    progress.broken();
    if (error instanceof CommandError && error.output) console.error(`\n${error.output}\n`);
    console.error(error instanceof Error ? error.message : error);
    process.exit(1);
  }
}

const started = performance.now();
await setUp();

// Two at a time, for two cores. Types come after the build: both write the generated types.
let built = false;
await Promise.all([
  check('Format', format).then(() => check('Lint', lint)),
  check('Build', build).then((passed) => {
    built = passed;
    return check('Types', types);
  }),
]);
let totalsLine = '0 passed, 1 failed';
if (built && !broken.signal.aborted) {
  await check('Tests', async () => {
    const result = await tests();
    totalsLine = `${result.passed} passed, ${result.failed} failed`;
    return result;
  });
} else {
  console.log('Tests … not run');
}

console.log(`\nChecks, in ${duration(performance.now() - started)}:`);
for (const { name, passed, ms } of steps) {
  console.log(`  ${name.padEnd(7)} ${passed ? 'passed' : 'FAILED'}  ${duration(ms)}`);
}
const failed = steps.some(({ passed }) => !passed) || !built;
console.log(failed ? 'Not everything passed.' : 'Everything passed.');
console.log(totalsLine);
process.exit(failed ? 1 : 0);
