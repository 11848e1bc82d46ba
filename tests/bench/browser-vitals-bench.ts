import type { Page } from '@playwright/test';
import type { Desk } from './browser-window';

export interface DemoPage {
  readonly name: string;
  readonly path: string;
  /** What people do there, harmless. */
  readonly act: (page: Page) => Promise<void>;
}

interface Vitals {
  readonly lcpMs: number;
  readonly inpMs: number;
  readonly cls: number;
}

export const VITALS_BARS = { lcpMs: 2000, inpMs: 200, cls: 0.05 } as const;

const tab = async (page: Page): Promise<void> => {
  for (let i = 0; i < 4; i++) await page.keyboard.press('Tab');
};

/** The pages of the demo, each with a few of its own interactions. */
export function demoPages(site: string, network: string): readonly DemoPage[] {
  const arrows = async (page: Page): Promise<void> => {
    for (const key of ['ArrowRight', 'ArrowRight', 'ArrowDown', 'ArrowLeft']) await page.keyboard.press(key);
  };
  return [
    { name: 'Sites', path: '/sites', act: tab },
    { name: 'Networks of a site', path: site, act: tab },
    {
      name: 'Drawing',
      path: `${network}/drawing`,
      act: async (page) => {
        await page.locator('[data-element="TR5"]').click();
        await arrows(page);
        await page.keyboard.press('Space');
        await page.getByRole('button', { name: 'Zoom in' }).click();
      },
    },
    {
      name: 'Lists',
      path: `${network}/lists`,
      act: async (page) => {
        await page.getByRole('grid').focus();
        await arrows(page);
        await page.getByRole('searchbox').pressSequentially('TR');
        await page.getByRole('tab', { name: /Pipes/ }).click();
      },
    },
    {
      name: 'Lift & ledger',
      path: `${network}/ledger?element=TR5`,
      act: async (page) => {
        await page.getByRole('navigation', { name: 'Traps' }).getByRole('link').nth(3).click();
        await tab(page);
      },
    },
    {
      name: 'Cases',
      path: `${network}/cases`,
      act: async (page) => {
        await page.getByRole('region', { name: 'Cases' }).getByRole('link').nth(1).click();
        await tab(page);
      },
    },
    { name: 'Cases side by side', path: `${network}/cases?show=compare`, act: tab },
    { name: 'Try changes', path: `${network}/try`, act: tab },
    {
      name: 'Method',
      path: `${network}/method`,
      act: async (page) => {
        await page.locator('main a').nth(2).click();
        await tab(page);
      },
    },
    { name: 'Trap library', path: `${site}/library`, act: tab },
    { name: 'Your account', path: '/account', act: tab },
  ];
}

/** LCP, INP and CLS of each page, opened by its address with the application's files in the store. */
export async function* pageVitals(desk: Desk, pages: readonly DemoPage[]): AsyncGenerator<string> {
  const all: Vitals[] = [];
  for (const { name, path, act } of pages) {
    const page = await desk.usedWindow('/sites');
    await page.addInitScript(observeVitals);
    await page.goto(desk.address + path);
    await page.waitForLoadState('networkidle');
    await page.waitForTimeout(300);
    await act(page);
    // events are reported after the frame that they led to
    await page.waitForTimeout(300);
    const vitals = await page.evaluate(() => (globalThis as unknown as { vitals: Vitals }).vitals);
    all.push(vitals);
    await page.context().close();
    yield `  ${name}: ${wordsOf(vitals)}`;
  }
  const worst = (key: keyof Vitals) => Math.max(...all.map((vitals) => vitals[key]));
  yield `Worst page: ${wordsOf({ lcpMs: worst('lcpMs'), inpMs: worst('inpMs'), cls: worst('cls') })} (bars LCP ${VITALS_BARS.lcpMs} ms, INP ${VITALS_BARS.inpMs} ms, CLS ${VITALS_BARS.cls})`;
}

/** INP as long as there are fewer than 50 interactions: the longest of them (web.dev, "Interaction to Next Paint"). */
function wordsOf({ lcpMs, inpMs, cls }: Vitals): string {
  return `LCP ${lcpMs.toFixed(0)} ms, INP ${inpMs === 0 ? 'under 16' : inpMs.toFixed(0)} ms, CLS ${cls.toFixed(3)}`;
}

/** Runs in the page before anything else there. */
function observeVitals(): void {
  const vitals = { lcpMs: 0, inpMs: 0, cls: 0 };
  Object.assign(globalThis, { vitals });
  const watch = (type: string, take: (entry: PerformanceEntry) => void): void => {
    new PerformanceObserver((list) => list.getEntries().forEach(take)).observe({
      type,
      buffered: true,
      durationThreshold: 16,
    } as PerformanceObserverInit);
  };
  watch('largest-contentful-paint', ({ startTime }) => (vitals.lcpMs = startTime));
  watch('layout-shift', (entry) => {
    const { value, hadRecentInput } = entry as unknown as { value: number; hadRecentInput: boolean };
    // summed over the whole visit: never less than the largest session window that CLS counts
    if (!hadRecentInput) vitals.cls += value;
  });
  watch('event', (entry) => {
    const { interactionId, duration } = entry as unknown as { interactionId: number; duration: number };
    if (interactionId > 0) vitals.inpMs = Math.max(vitals.inpMs, duration);
  });
}
