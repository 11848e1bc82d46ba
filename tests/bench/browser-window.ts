import type { Browser, BrowserContext, Page } from '@playwright/test';
import { DEMO_PASSWORD } from '../../server/demo/demo-people';

declare global {
  interface Window {
    /** Where functions that run in the page leave the time that they measure, ms. Read by functions too: the pages allow no eval. */
    measuredMs?: number | Promise<number>;
  }
}

/** What was measured in the page, as soon as it is known. */
export function measured(page: Page): Promise<number> {
  return page.evaluate(async () => (await window.measuredMs) ?? Number.NaN);
}

/** As people look at it: a laptop's window, Chromium without a graphics processor, so everything is painted by the same two cores. */
export const WINDOW = { width: 1440, height: 900 } as const;

export async function launch(): Promise<Browser> {
  const { chromium } = await import('@playwright/test');
  return chromium.launch({
    executablePath: process.env['RISEBACK_CHROMIUM'] ?? '/usr/bin/chromium',
    args: [
      '--no-sandbox',
      '--disable-gpu',
      '--disable-quic',
      '--no-first-run',
      '--disable-background-networking',
      '--disable-component-update',
      '--disable-sync',
    ],
  });
}

/** A designer's windows on the server; signed in once, since signing in is slow by design. */
export class Desk {
  private constructor(
    private readonly browser: Browser,
    readonly address: string,
    private readonly signedIn: Awaited<ReturnType<BrowserContext['storageState']>>,
  ) {}

  static async open(browser: Browser, address: string): Promise<Desk> {
    const context = await browser.newContext();
    const answer = await context.request.post(`${address}/api/session`, {
      data: { email: 'designer@ternquay.example', password: DEMO_PASSWORD },
    });
    if (!answer.ok()) throw new Error(`signing in was answered ${answer.status()}`);
    const desk = new Desk(browser, address, await context.storageState());
    await context.close();
    return desk;
  }

  /** A browser that has nothing of the application yet. */
  async freshWindow(): Promise<Page> {
    const context = await this.browser.newContext({
      viewport: WINDOW,
      storageState: this.signedIn,
      permissions: ['clipboard-read', 'clipboard-write'],
    });
    // tsx names functions by a helper of its own, which those that run in a page would miss
    await context.addInitScript({ content: 'globalThis.__name ??= (named) => named' });
    return context.newPage();
  }

  /** With the application's files in the browser's store, as on every visit but the first. */
  async usedWindow(path: string): Promise<Page> {
    const page = await this.freshWindow();
    await page.goto(this.address + path);
    await page.waitForLoadState('networkidle');
    await page.goto('about:blank');
    return page;
  }
}

/** Processor time that the page's process has taken so far, s. A busy machine lengthens waits, this much less. */
export async function pageCpuSeconds(page: Page): Promise<number> {
  const session = await page.context().newCDPSession(page);
  await session.send('Performance.enable', { timeDomain: 'threadTicks' });
  const { metrics } = await session.send('Performance.getMetrics');
  await session.detach();
  return metrics.find(({ name }) => name === 'ProcessTime')?.value ?? Number.NaN;
}
