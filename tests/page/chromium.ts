import { existsSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { type BrowserContext, chromium, type Page } from 'playwright-core';

/** Where Debian and others put Chromium; undefined where there is none. */
export const chromiumPath = ['/usr/bin/chromium', '/usr/bin/chromium-browser', '/usr/bin/google-chrome'].find((path) =>
  existsSync(path),
);

const flags = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];

export interface Browser {
  readonly context: BrowserContext;
  close(): Promise<void>;
}

/** Headless Chromium with a new, empty profile. */
export async function openBrowser(): Promise<Browser> {
  const profile = mkdtempSync(join(tmpdir(), 'rungcheck-browser-'));
  const context = await chromium.launchPersistentContext(profile, {
    executablePath: chromiumPath as string,
    headless: true,
    args: flags,
    viewport: { width: 1280, height: 900 },
  });
  return {
    context,
    async close() {
      await context.close();
      rmSync(profile, { recursive: true, force: true });
    },
  };
}

export interface Visit {
  readonly page: Page;
  /** Errors of the console and of scripts, and requests for anything but the page itself and its worker. */
  readonly complaints: string[];
}

/** Opens a file and waits until its script has set it up. */
export async function visit({ context }: Browser, file: string): Promise<Visit> {
  const page = await context.newPage();
  const complaints: string[] = [];
  page.on('console', (message) => {
    if (message.type() === 'error' || message.type() === 'warning') complaints.push(message.text());
  });
  page.on('pageerror', (error) => complaints.push(error.message));
  page.on('request', (request) => {
    if (request.url() !== `file://${file}` && !request.url().startsWith('blob:')) complaints.push(request.url());
  });
  await page.goto(`file://${file}`);
  await page.waitForSelector('html[data-ready=yes]');
  return { page, complaints };
}
