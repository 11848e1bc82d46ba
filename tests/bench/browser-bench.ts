import { cpus, loadavg } from 'node:os';
import { fileURLToPath } from 'node:url';
import { makeNetwork } from './bench-networks';
import { startBenchServer } from './bench-server';
import { dragFrames, editToPressures, openingTime } from './browser-drawing-bench';
import { laidOut } from './browser-networks';
import { pasteRows } from './browser-paste-bench';
import { demoPages, pageVitals } from './browser-vitals-bench';
import { Desk, launch } from './browser-window';

/** Pipes of a network of so many elements: half of them nodes. */
const pipesOf = (elements: number): number => elements / 2;

/** What people wait for, in the built application in Chromium. Times, not ratios: printed with the machine's load, never asserted. */
export async function* browserBench(program = builtServer()): AsyncGenerator<string> {
  const server = await startBenchServer(program);
  const browser = await launch();
  try {
    const person = await server.signIn('designer');
    const get = async <T>(path: string): Promise<T> =>
      (await (await fetch(server.address + path, { headers: person })).json()) as T;
    const [site] = await get<{ id: string }[]>('/api/sites');
    const siteId = site?.id ?? '';
    const [demo] = await get<{ id: string }[]>(`/api/sites/${siteId}/networks`);
    const sitePath = `/sites/${siteId}`;
    const make = async (file: object): Promise<string> =>
      `${sitePath}/networks/${await makeNetwork(server, person, siteId, file)}`;
    const desk = await Desk.open(browser, server.address);

    yield `The browser: Chromium without a graphics processor, ${machine()}`;
    for (const [elements, barS] of [
      [500, 1.5],
      [2000, 4],
    ] as const) {
      const network = await make(laidOut(`${elements} elements`, pipesOf(elements)));
      yield await openingTime(desk, `${network}/drawing`, elements, barS);
      if (elements === 500) yield await dragFrames(desk, `${network}/drawing`, elements, 32);
    }
    const edited = await make(laidOut('200 pipes', 200));
    yield await editToPressures(desk, `${edited}/drawing`, 200, 150);
    const empty = await make({ format: 'riseback-network', version: 1, name: 'Rows' });
    yield await pasteRows(desk, empty, 500, 2000);
    yield* pageVitals(desk, demoPages(sitePath, `${sitePath}/networks/${demo?.id ?? ''}`));
    yield `At the end: ${machine()}`;
  } finally {
    await browser.close();
    await server.stop();
  }
}

function builtServer(): string {
  return fileURLToPath(new URL('../../dist/server/main.js', import.meta.url));
}

/** A load above the number of processors means that everything had to wait for something else. */
function machine(): string {
  return `${cpus().length} processors, load ${loadavg()[0]?.toFixed(1) ?? '?'}`;
}
