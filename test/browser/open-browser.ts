import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { chromium, type BrowserContext, type Page } from 'playwright-core';

export type Size = 'wall' | 'hd' | 'wide' | 'desk' | 'phone' | 'narrow';
export const sizes: Readonly<Record<Size, { readonly width: number; readonly height: number }>> = {
  wall: { width: 3840, height: 2160 },
  hd: { width: 1920, height: 1080 },
  wide: { width: 1440, height: 900 },
  desk: { width: 1366, height: 768 },
  phone: { width: 390, height: 844 },
  narrow: { width: 320, height: 640 },
};

const flags = ['--headless', '--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run', '--disable-background-networking', '--disable-component-update', '--disable-sync'];

export interface Browser {
  readonly context: BrowserContext;
  /** A page at an address with a size and theme; every error of its script is kept. */
  readonly open: (url: string, size: Size, theme?: 'light' | 'dark') => Promise<Page>;
  readonly errors: string[];
  readonly close: () => Promise<void>;
}

export async function openBrowser(): Promise<Browser> {
  const profile = mkdtempSync(join(tmpdir(), 'vouchline-browser-'));
  const context = await chromium.launchPersistentContext(profile, { executablePath: process.env['CHROMIUM'] ?? '/usr/bin/chromium', args: flags, locale: 'en-GB', reducedMotion: 'reduce' });
  const errors: string[] = [];
  return {
    context, errors,
    open: async (url, size, theme = 'light') => {
      const page = await context.newPage();
      page.on('pageerror', (error) => { errors.push(String(error)); });
      page.on('console', (message) => { if (/Content Security Policy|Lit is in dev mode|Multiple versions/.test(message.text())) errors.push(message.text().slice(0, 160)); });
      page.setDefaultTimeout(15_000);
      await page.setViewportSize(sizes[size]);
      await page.emulateMedia({ colorScheme: theme, reducedMotion: 'reduce' });
      await page.goto(url);
      return page;
    },
    close: async () => {
      await context.close();
      rmSync(profile, { recursive: true, force: true });
    },
  };
}
