import { randomUUID } from 'node:crypto';
import { applyBatch, toFile } from '@riseback/network';
import fc from 'fast-check';
import { expect, it } from 'vitest';
import { NetworkRepository } from '../../server/src/networks/network-repository';
import { solverHashOf } from '../../server/src/networks/network-hashes';
import { move, opsOf, SEED, ternQuayJson } from '../properties/network-arbitraries';
import { batchOf, makeNetwork, sendBatch } from './network-samples';
import { TestServer } from './test-server';

it('whatever is edited, the rows, the server’s memory and the one reducer hold the same network', async () => {
  await fc.assert(
    fc.asyncProperty(fc.array(move, { minLength: 1, maxLength: 12 }), async (moves) => {
      const server = new TestServer({ solver: { solve: () => Promise.resolve({ end: 'superseded' }) } });
      const designer = server.as('designer');
      const id = await makeNetwork(designer, server.siteId, ternQuayJson() as object);
      const rows = new NetworkRepository(server.db);
      const first = rows.document(id);
      if (first === undefined) throw new Error('the network is stored');
      let document = first;
      let version = 1;
      for (const made of moves) {
        const ops = opsOf(document, made);
        const applied = applyBatch(document, ops);
        if (ops.length === 0 || !applied.ok) continue;
        ({ document } = applied);
        await sendBatch(designer, id, version, batchOf(ops)).expect(200);
        version += 1;
        expect(rows.document(id)).toEqual(document);
      }
      expect((await designer.get(`/api/networks/${id}/file`).expect(200)).body).toEqual(toFile(document));
      expect(rows.head(id)).toMatchObject({ version, solverHash: solverHashOf(document) });

      // undone step by step, newest first, it is the first network again
      for (const edit of rows.editsSince(id, 1).reverse()) {
        const undo = { batchId: randomUUID(), label: 'undo', ops: [...edit.inverse] };
        // a batch that changed nothing has nothing to undo
        if (undo.ops.length === 0) continue;
        await sendBatch(designer, id, version, undo).expect(200);
        version += 1;
      }
      expect(rows.document(id)).toEqual(first);
      expect(rows.head(id)?.solverHash).toBe(solverHashOf(first));
      expect(server.db.$client.pragma('foreign_key_check')).toEqual([]);
      server.close();
    }),
    { seed: SEED, numRuns: 12 },
  );
});
