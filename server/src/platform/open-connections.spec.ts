import { createServer, get, type IncomingMessage, type Server } from 'node:http';
import { connect, type AddressInfo } from 'node:net';
import { buffer } from 'node:stream/consumers';
import { afterEach, beforeEach, expect, it } from 'vitest';
import { OpenConnections } from './open-connections';

/** Far more than a connection buffers. */
const LARGE = Buffer.alloc(32 * 1024 * 1024, 'x');

let server: Server;
let connections: OpenConnections;
let port = 0;
let answered: Promise<void>;
beforeEach(async () => {
  let tellAnswered: () => void = () => undefined;
  answered = new Promise((resolve) => (tellAnswered = resolve));
  server = createServer((_req, res) => {
    res.end(LARGE);
    tellAnswered();
  });
  connections = new OpenConnections(server);
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  ({ port } = server.address() as AddressInfo);
});
afterEach(() => {
  server.closeAllConnections();
  server.close();
});

const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));

it('leaves an answer alone that was handed over but is not with its client yet', async () => {
  const answer = new Promise<IncomingMessage>((resolve) => get({ port, host: '127.0.0.1' }, resolve));
  await answered;
  connections.closeIdleFor(0);
  expect((await buffer(await answer)).length).toBe(LARGE.length);
});

it('closes a connection that has been silent for so long, and no earlier', async () => {
  const socket = connect(port, '127.0.0.1');
  const closed = new Promise((resolve) => socket.once('close', resolve));
  await new Promise((resolve) => socket.once('connect', resolve));
  await pause(50);
  connections.closeIdleFor(10_000);
  await pause(50);
  expect(socket.destroyed).toBe(false);
  connections.closeIdleFor(40);
  await closed;
});
