import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import {
  type BrowserContext,
  type BrowserContextOptions,
  chromium,
  type Page,
} from 'playwright-core';

const FLAGS = [
  '--headless',
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];

export interface TestBrowser {
  /** A page of a person's own, with cookies of its own; 1280 by 800 unless told otherwise. */
  open(options?: BrowserContextOptions): Promise<Page>;
  /** Ends the browser; throws if any page reported an error that was not expected. */
  close(): Promise<void>;
  /** Takes the errors reported so far that the test expects, so that `close` does not throw for them. */
  expectErrors(pattern: RegExp): string[];
}

/** Debian's Chromium with a new, empty profile. Errors on any page's console fail the test that closes it. */
export async function startBrowser(): Promise<TestBrowser> {
  const profile = await mkdtemp(join(tmpdir(), 'slackwater-browser-'));
  const browser = await chromium.launch({
    executablePath: '/usr/bin/chromium',
    args: FLAGS,
    // Crash reports and caches belong to the profile too, not to the person who runs the tests.
    env: { ...process.env, HOME: profile, XDG_CONFIG_HOME: profile, XDG_CACHE_HOME: profile },
  });
  let errors: string[] = [];
  const watch = (context: BrowserContext): void => {
    context.on('console', (message) => {
      if (message.type() !== 'error') return;
      errors.push(`${message.page()?.url() ?? 'a page'}: ${message.text()}`);
    });
    context.on('weberror', (event) => errors.push(String(event.error())));
  };
  return {
    async open(options = {}) {
      const context = await browser.newContext({
        viewport: { width: 1280, height: 800 },
        locale: 'en-GB',
        timezoneId: 'UTC',
        ...options,
      });
      watch(context);
      return context.newPage();
    },
    expectErrors(pattern) {
      const found = errors.filter((error) => pattern.test(error));
      errors = errors.filter((error) => !pattern.test(error));
      return found;
    },
    async close() {
      await browser.close();
      await rm(profile, { recursive: true, force: true });
      if (errors.length > 0) throw new Error(`The browser reported:\n${errors.join('\n')}`);
    },
  };
}
