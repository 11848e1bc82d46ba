// What a browser must have of our scripts before the first page can show: its size over the wire, and the most it may be.
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';

/** gzip at its best, as `compressPages` writes it; browsers that take brotli get less. 1 kB = 1,000 bytes. */
export const MOST_INITIAL_KB = 300;

/** Scripts that index.html asks for, and whatever these import before they run; not what a route loads later. */
export function initialJavaScript(folder) {
  const found = new Map();
  const waiting = scriptsOf(readFileSync(join(folder, 'index.html'), 'utf8'));
  for (let name = waiting.pop(); name !== undefined; name = waiting.pop()) {
    if (found.has(name)) continue;
    const content = readFileSync(join(folder, name));
    found.set(name, gzipSync(content, { level: 9 }).length);
    waiting.push(...importsOf(content.toString()));
  }
  return { files: [...found.keys()], kB: [...found.values()].reduce((sum, bytes) => sum + bytes, 0) / 1000 };
}

/** Fails the build when the first page would ask for more than its share. */
export function demandSmallStart(folder, log, mostKB = MOST_INITIAL_KB) {
  const { files, kB } = initialJavaScript(folder);
  const words = `Initial JavaScript: ${kB.toFixed(1)} kB gzip in ${files.length} files, of ${mostKB} kB at most`;
  if (kB > mostKB) {
    throw new Error(
      `${words}. Load what the first page does not need by a route or @defer, or find what grew: ${files}`,
    );
  }
  log(words);
}

function scriptsOf(html) {
  return [...html.matchAll(/<(?:script|link)\b[^>]*?(?:src|href)="\/?([^":]+\.js)"/g)].map(([, name]) => name);
}

/** `import(…)` is not among them: that comes later. */
function importsOf(script) {
  return [...script.matchAll(/(?:\bfrom|\bimport)\s*["']\.\/([\w.-]+\.js)["']/g)].map(([, name]) => name);
}
