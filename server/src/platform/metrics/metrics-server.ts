import { createServer, type Server } from 'node:http';
import type { Log } from '../log';
import type { Metrics } from './metrics';

export interface MetricsAddress {
  readonly host: string;
  readonly port: number;
}

/**
 * GET /metrics on a port of its own, for the machine's own network only: it asks nobody who they are. It never changes
 * anything, and a server that cannot have the port does not start.
 */
export function serveMetrics(metrics: Metrics, { host, port }: MetricsAddress, log: Log): Promise<Server> {
  const server = createServer((req, res) => {
    if (req.method !== 'GET' || req.url?.split('?', 1)[0] !== '/metrics') {
      res.writeHead(404).end();
      return;
    }
    metrics.text().then(
      (text) => res.writeHead(200, { 'Content-Type': metrics.contentType, 'Cache-Control': 'no-store' }).end(text),
      (error: unknown) => {
        log.error({ err: error }, 'figures cannot be collected');
        res.writeHead(500).end();
      },
    );
  });
  server.requestTimeout = 10_000;
  return new Promise((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, host, () => {
      server.off('error', reject);
      // the application's own port keeps the process alive
      server.unref();
      resolve(server);
    });
  });
}
