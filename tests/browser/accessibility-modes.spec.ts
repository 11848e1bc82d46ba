import { demoNetworkPath, signIn } from './people';
import { expect, test } from './violations';

test('who asks for less motion gets none', async ({ page }) => {
  await page.emulateMedia({ reducedMotion: 'reduce' });
  await signIn(page, 'designer');
  const network = await demoNetworkPath(page);
  for (const path of [`${network}/drawing?element=TR5`, `${network}/lists`, `${network}/ledger?element=TR5`]) {
    await page.goto(path);
    await page.getByText(/^Solved \d\d:\d\d/).waitFor();
    const moving = await page.evaluate(() =>
      [...document.querySelectorAll('*')]
        .filter((element) => {
          const { transitionDuration, animationName } = getComputedStyle(element);
          return animationName !== 'none' || transitionDuration.split(', ').some((each) => each !== '0s');
        })
        .map(({ tagName, className }) => `${tagName} ${String(className)}`),
    );
    expect(moving, path).toEqual([]);
  }
});

test('with forced colours verdicts keep their shapes and the drawing its ink', async ({ page }) => {
  await page.emulateMedia({ forcedColors: 'active' });
  await signIn(page, 'designer');
  const network = await demoNetworkPath(page);
  await page.goto(`${network}/drawing?element=TR5`);
  await page.getByText(/^Solved \d\d:\d\d/).waitFor();
  const unseen = await page.evaluate(() => {
    const paper = getComputedStyle(document.body).backgroundColor;
    const drawn = (shape: Element): string[] => {
      const { fill, stroke } = getComputedStyle(shape);
      return [fill, stroke].filter((colour) => colour !== 'none');
    };
    return [...document.querySelectorAll('app-status-mark svg, .sheet-area [data-element]')]
      .filter((mark) =>
        [...mark.querySelectorAll('path, circle, rect')].flatMap(drawn).every((colour) => colour === paper),
      )
      .map(({ outerHTML }) => outerHTML.slice(0, 120));
  });
  expect(unseen).toEqual([]);
});
