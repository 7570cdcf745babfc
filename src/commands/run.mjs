import { spawn } from 'node:child_process';
import { fileURLToPath } from 'node:url';

/** Top of the source tree. */
export const ROOT = fileURLToPath(new URL('../../', import.meta.url));

const TAIL_LINES = 25;

/** Something failed: one sentence for the person who started the command, and what a program said of it. */
export class CommandError extends Error {
  /**
   * @param {string} message
   * @param {string} [output]
   */
  constructor(message, output = '') {
    super(message);
    this.output = output.trim().split('\n').slice(-TAIL_LINES).join('\n');
  }
}

/**
 * Runs a program in the source tree and collects what it prints.
 * @param {string} command
 * @param {string[]} args
 * @param {{ env?: Record<string, string | undefined>, signal?: AbortSignal, stdin?: 'ignore' | 'inherit' }} [options]
 * @returns {Promise<{ code: number, output: string }>}
 */
export function run(command, args, { env = process.env, signal, stdin = 'ignore' } = {}) {
  return new Promise((resolve, reject) => {
    const child = spawn(command, args, { cwd: ROOT, env, signal, stdio: [stdin, 'pipe', 'pipe'] });
    let output = '';
    child.stdout.on('data', (chunk) => (output += chunk));
    child.stderr.on('data', (chunk) => (output += chunk));
    child.once('error', reject);
    child.once('close', (code) => resolve({ code: code ?? 1, output }));
  });
}
