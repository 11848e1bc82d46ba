import { test as base, expect } from '@playwright/test';

/** Every test of these files also fails on a content-security violation or an error that nobody caught. */
export const test = base.extend<{ quietPages: undefined }>({
  quietPages: [
    async ({ context }, use) => {
      const complaints: string[] = [];
      context.on('weberror', (error) => complaints.push(error.error().message));
      context.on('console', (message) => {
        if (message.type() === 'error' && !message.text().startsWith('Failed to load resource'))
          complaints.push(message.text());
      });
      await context.exposeFunction('reportViolation', (text: string) => complaints.push(text));
      await context.addInitScript(() => {
        addEventListener('securitypolicyviolation', (event) => {
          const report = (globalThis as unknown as { reportViolation: (text: string) => void }).reportViolation;
          report(`${event.violatedDirective} ${event.blockedURI} ${event.sourceFile}`);
        });
      });
      await use(undefined);
      expect(complaints).toEqual([]);
    },
    { auto: true },
  ],
});
export { expect };
