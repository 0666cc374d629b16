import { mkdir } from 'node:fs/promises';
import path from 'node:path';
import { chromium, type Browser, type Page } from 'playwright-core';

export const sizes = { phone: { width: 390, height: 844 }, wide: { width: 1280, height: 800 } } as const;

export interface PageOptions {
  size?: keyof typeof sizes;
  /** The light or the dark scheme. */
  scheme?: 'light' | 'dark';
  baseUrl: string;
}

/** Chromium from Debian; with `camera` (see makeCameraFeed) it has one, and asks nobody for leave to use it. */
export async function openBrowser({ camera }: { camera?: string } = {}): Promise<Browser> {
  const cameraFlags = camera
    ? ['--use-fake-ui-for-media-stream', '--use-fake-device-for-media-stream', `--use-file-for-fake-video-capture=${camera}`]
    : [];
  return chromium.launch({
    executablePath: process.env.CHROMIUM_PATH ?? '/usr/bin/chromium',
    headless: true,
    args: ['--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run', '--disable-background-networking',
      '--disable-component-update', '--disable-sync', ...cameraFlags],
  });
}

/** A person's own browser window: no cookies shared with another's. Errors thrown by the page are kept in `problems`. */
export async function openPage(browser: Browser, options: PageOptions): Promise<{ page: Page; problems: string[] }> {
  const context = await browser.newContext({
    viewport: sizes[options.size ?? 'phone'],
    colorScheme: options.scheme ?? 'light',
    baseURL: options.baseUrl,
    locale: 'en-GB',
    hasTouch: options.size !== 'wide',
    reducedMotion: 'reduce',
  });
  const page = await context.newPage();
  const problems: string[] = [];
  page.on('pageerror', (error) => problems.push(error.message));
  return { page, problems };
}

/**
 * Waits until a screen shows its content: a heading that says the state, and nothing that is still loading.
 * (Playwright's `networkidle` does not serve: an answer whose body the app has no use for counts as under way for ever.)
 */
export async function settled(page: Page): Promise<void> {
  await page.getByRole('heading', { level: 1 }).first().waitFor();
  await page.getByRole('status').filter({ hasText: /…\s*$/ }).first().waitFor({ state: 'hidden' });
}

const screens = path.join(__dirname, '..', '..', '..', 'test-results', 'screens');

/** Keeps a picture of the whole page under test-results/screens, for people to look at. */
export async function screenshot(page: Page, name: string): Promise<string> {
  await mkdir(screens, { recursive: true });
  const file = path.join(screens, `${name}.png`);
  await page.screenshot({ path: file, fullPage: true });
  return file;
}
