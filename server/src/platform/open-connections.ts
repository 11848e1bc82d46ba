import type { Server } from 'node:http';
import type { Socket } from 'node:net';

interface State {
  underWay: number;
  idleSince: number;
}

/**
 * The connections of a server and since when each has nothing to do. Node's own `closeIdleConnections` counts a
 * connection as idle once its answer is handed over, though its client may not have it yet, and one whose request is on
 * its way; both would be cut.
 */
export class OpenConnections {
  private readonly states = new Map<Socket, State>();

  constructor(server: Server) {
    server.on('connection', (socket: Socket) => {
      this.states.set(socket, { underWay: 0, idleSince: performance.now() });
      socket.once('close', () => this.states.delete(socket));
    });
    server.on('request', (req, res) => {
      const state = this.states.get(req.socket);
      if (state === undefined) return;
      state.underWay += 1;
      res.once('close', () => {
        state.underWay -= 1;
        state.idleSince = performance.now();
      });
    });
  }

  /** Closes those that have had nothing to do for so long. */
  closeIdleFor(ms: number): void {
    const latest = performance.now() - ms;
    for (const [socket, { underWay, idleSince }] of this.states) {
      if (underWay === 0 && idleSince <= latest) socket.destroy();
    }
  }
}
