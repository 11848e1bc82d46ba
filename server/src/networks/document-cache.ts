import { COLLECTION_NAMES, type NetworkDocument } from '@riseback/network';
import { toStoredDocument } from './stored-document';

const MOST_DOCUMENTS = 16;
/** An element takes about 2 kB in memory, so that all of them stay under some 200 MB; the newest document is kept whatever its size. */
const MOST_ELEMENTS = 100_000;

interface CachedDocument {
  readonly version: number;
  readonly document: NetworkDocument;
  readonly elements: number;
  text?: Buffer;
}

/** The documents that were used last, so that an edit does not read a whole network again and a reader is not served it built anew. */
export class DocumentCache {
  private readonly documents = new Map<string, CachedDocument>();
  private elements = 0;

  find(networkId: string, version: number): NetworkDocument | undefined {
    const cached = this.documents.get(networkId);
    return cached?.version === version ? cached.document : undefined;
  }

  remember(networkId: string, version: number, document: NetworkDocument): void {
    this.forget(networkId);
    const elements = COLLECTION_NAMES.reduce((sum, name) => sum + document[name].size, 0);
    this.documents.set(networkId, { version, document, elements });
    this.elements += elements;
    for (const oldest of this.documents.keys()) {
      if (oldest === networkId) break;
      if (this.documents.size <= MOST_DOCUMENTS && this.elements <= MOST_ELEMENTS) break;
      this.forget(oldest);
    }
  }

  /** The JSON text of a remembered document as it crosses the wire, made once. */
  text(networkId: string, version: number): Buffer | undefined {
    const cached = this.documents.get(networkId);
    if (cached?.version !== version) return undefined;
    return (cached.text ??= Buffer.from(JSON.stringify(toStoredDocument(cached.document))));
  }

  clear(): void {
    this.documents.clear();
    this.elements = 0;
  }

  private forget(networkId: string): void {
    const cached = this.documents.get(networkId);
    if (cached === undefined) return;
    this.documents.delete(networkId);
    this.elements -= cached.elements;
  }
}
