import { chmodSync, rmSync } from 'node:fs';
import { connect, createServer, type Server, type Socket } from 'node:net';
import { isAbsolute, relative } from 'node:path';
import { text } from 'node:stream/consumers';
import * as z from 'zod';
import type { Backups } from './backups';
import type { BackupFacts } from './sealed-copy';

/*
 * How a command on the machine reaches the connection that writes, which is the running server's: a socket file beside
 * the database that only the server's own account can open. One line of JSON goes in, one comes out.
 */

const Order = z.strictObject({ backup: z.string().min(1).refine(isAbsolute) });
const Answer = z.union([z.object({ contentHash: z.string(), madeAt: z.string() }), z.object({ refused: z.string() })]);

/** The least that systems allow for a socket's path, its ending zero taken off. */
const LONGEST_SOCKET_PATH = 103;
const LONGEST_ORDER = 16_384;
const PATIENCE_MS = 10_000;

/** The server would not or could not; the message is its own. */
export class BackupRefusedError extends Error {
  override readonly name = 'BackupRefusedError';
}

/** @throws Error when the path is too long for a socket */
export function listenForBackupOrders(databasePath: string, backups: Pick<Backups, 'make'>): Promise<Server> {
  const path = socketPathOf(databasePath);
  // One left by a killed server; a living one cannot be there, since the database is held exclusively.
  rmSync(path, { force: true });
  const server = createServer({ allowHalfOpen: true }, (socket) => void answer(socket, backups));
  return new Promise((resolve, reject) => {
    server.once('error', reject);
    server.listen(path, () => {
      chmodSync(path, 0o600);
      server.off('error', reject);
      resolve(server);
    });
  });
}

/**
 * Has the running server take a backup.
 * @returns undefined when no server runs on this database
 * @throws BackupRefusedError
 */
export async function orderBackup(databasePath: string, file: string): Promise<BackupFacts | undefined> {
  const socket = await connected(socketPathOf(databasePath));
  if (socket === undefined) return undefined;
  socket.end(`${JSON.stringify({ backup: file })}\n`);
  const said = await text(socket);
  if (said === '') throw new BackupRefusedError('The server ended before the backup was taken.');
  const parsed = Answer.parse(JSON.parse(said));
  if ('refused' in parsed) throw new BackupRefusedError(parsed.refused);
  return parsed;
}

async function answer(socket: Socket, backups: Pick<Backups, 'make'>): Promise<void> {
  socket.on('error', () => socket.destroy());
  try {
    const { backup } = Order.parse(JSON.parse(await orderOf(socket)));
    const facts = await backups.make(backup);
    socket.end(`${JSON.stringify(facts)}\n`);
  } catch (error) {
    socket.end(`${JSON.stringify({ refused: error instanceof Error ? error.message : String(error) })}\n`);
  }
}

function orderOf(socket: Socket): Promise<string> {
  return new Promise((resolve, reject) => {
    let said = '';
    const give = setTimeout(() => reject(new Error('no order came')), PATIENCE_MS);
    socket.on('data', (chunk: Buffer) => {
      said += chunk.toString();
      if (said.length > LONGEST_ORDER) reject(new Error('the order is too long'));
    });
    socket.once('end', () => resolve(said));
    socket.once('close', () => clearTimeout(give));
  });
}

function connected(path: string): Promise<Socket | undefined> {
  return new Promise((resolve, reject) => {
    const socket = connect({ path, allowHalfOpen: true });
    socket.once('connect', () => resolve(socket));
    socket.once('error', (error: NodeJS.ErrnoException) => {
      if (error.code === 'ENOENT' || error.code === 'ECONNREFUSED') resolve(undefined);
      else reject(error);
    });
  });
}

/** Socket paths are short by law; the one seen from the working folder may be shorter. */
function socketPathOf(databasePath: string): string {
  const path = `${databasePath}-control`;
  const seen = relative(process.cwd(), path);
  const shorter = seen.length < path.length ? seen : path;
  if (Buffer.byteLength(shorter) <= LONGEST_SOCKET_PATH) return shorter;
  throw new Error(
    `the path ${shorter} is too long for a socket (${LONGEST_SOCKET_PATH} bytes): npm run backup cannot reach this server; keep the database in a folder with a shorter path`,
  );
}
