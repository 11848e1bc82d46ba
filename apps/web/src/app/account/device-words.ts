/** In the order in which they are looked for: most browsers also name those that they descend from. */
const BROWSERS: readonly (readonly [RegExp, string])[] = [
  [/\bEdg(e|A|iOS)?\//, 'Edge'],
  [/\bOPR\//, 'Opera'],
  [/\b(Firefox|FxiOS)\//, 'Firefox'],
  [/\bHeadlessChrome\//, 'Chrome'],
  [/\b(Chrome|CriOS|Chromium)\//, 'Chrome'],
  [/\bVersion\/[\d.]+ .*Safari\//, 'Safari'],
];
const DEVICES: readonly (readonly [RegExp, string])[] = [
  [/\biPhone\b/, 'an iPhone'],
  [/\biPad\b/, 'an iPad'],
  [/\bAndroid\b.*\bMobile\b/, 'an Android phone'],
  [/\bAndroid\b/, 'an Android tablet'],
  [/\bWindows\b/, 'Windows'],
  [/\bMacintosh\b|\bMac OS X\b/, 'a Mac'],
  [/\bCrOS\b/, 'a Chromebook'],
  [/\bLinux\b|\bX11\b/, 'Linux'],
];

/** What a browser said of itself when it signed in, in words; a hint to its owner, and proof of nothing. */
export function deviceWords(agent: string): string {
  const browser = find(BROWSERS, agent);
  const device = find(DEVICES, agent);
  if (browser !== undefined) return device === undefined ? browser : `${browser} on ${device}`;
  return device === undefined ? 'A device that did not say what it is' : `A browser on ${device}`;
}

function find(list: readonly (readonly [RegExp, string])[], agent: string): string | undefined {
  return list.find(([pattern]) => pattern.test(agent))?.[1];
}
