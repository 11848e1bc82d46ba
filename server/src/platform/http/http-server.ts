import { createServer, STATUS_CODES, type RequestListener, type Server } from 'node:http';
import type { Socket } from 'node:net';
import { problemOf, type ProblemType } from '../problem';

export interface ServerLimits {
  /** From the first byte of a request to the end of its headers. */
  readonly headersMs: number;
  /** From the first byte of a request to the end of its body. */
  readonly requestMs: number;
  /** Without a byte either way: an answer that does not come, or a reader that does not read. Streams say something more often. */
  readonly silenceMs: number;
  readonly connections: number;
}

export const SERVER_LIMITS: ServerLimits = {
  headersMs: 10_000,
  requestMs: 60_000,
  silenceMs: 90_000,
  connections: 10_000,
};
const LARGEST_HEADERS_BYTES = 16 * 1024;
/** How often Node looks for requests that have run out of time. */
const CHECKS = 10;

/** What Node's parser refuses before there is a request, by the code of its error. */
const REFUSALS: Readonly<Record<string, { readonly type: ProblemType; readonly detail: string }>> = {
  ERR_HTTP_REQUEST_TIMEOUT: { type: 'request-timeout', detail: 'The request did not arrive whole in time.' },
  HPE_HEADER_OVERFLOW: {
    type: 'headers-too-large',
    detail: `The headers may hold ${String(LARGEST_HEADERS_BYTES / 1024)} kB at most.`,
  },
};

/** An HTTP server on which nothing that is slow, or never ends, can stay for long. */
export function boundedServer(handler: RequestListener, limits: ServerLimits = SERVER_LIMITS): Server {
  const server = createServer(
    {
      headersTimeout: limits.headersMs,
      requestTimeout: limits.requestMs,
      connectionsCheckingInterval: Math.ceil(limits.headersMs / CHECKS),
      maxHeaderSize: LARGEST_HEADERS_BYTES,
    },
    handler,
  );
  server.timeout = limits.silenceMs;
  server.maxConnections = limits.connections;
  server.on('clientError', refuse);
  return server;
}

function refuse(error: NodeJS.ErrnoException, socket: Socket): void {
  // gone already, or in the middle of an answer that must not be taken for a whole one
  if (!socket.writable || socket.bytesWritten > 0 || error.code === 'ECONNRESET') {
    socket.destroy();
    return;
  }
  const { type, detail } = REFUSALS[error.code ?? ''] ?? { type: 'bad-request', detail: 'This is not HTTP.' };
  const problem = problemOf(type, detail);
  const body = JSON.stringify(problem);
  const { status } = problem;
  socket.end(
    [
      `HTTP/1.1 ${String(status)} ${STATUS_CODES[status] ?? ''}`,
      'Content-Type: application/problem+json; charset=utf-8',
      `Content-Length: ${String(Buffer.byteLength(body))}`,
      'Cache-Control: no-store',
      'Connection: close',
      '',
      body,
    ].join('\r\n'),
    // a client that does not read this either must not keep the connection
    () => socket.destroy(),
  );
}
