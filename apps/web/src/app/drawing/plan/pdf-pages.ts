import type { PDFDocumentProxy } from 'pdfjs-dist';

/** Laid beside the pages by the build (angular.json), of the same version as the reader. */
const READER_FOLDER = '/pdf/';

/** The part of Trusted Types that is used; TypeScript's own library does not know them. */
interface TrustedTypes {
  createPolicy(
    name: string,
    rules: { createScriptURL: (asked: string) => string },
  ): { createScriptURL(asked: string): unknown };
}

let workerUrl: unknown;

/** The reader's worker has one address, whatever is asked for; the content security policy admits this policy by its name. */
function readerWorkerUrl(): unknown {
  const address = `${READER_FOLDER}pdf.worker.min.mjs`;
  const { trustedTypes } = globalThis as { trustedTypes?: TrustedTypes };
  workerUrl ??=
    trustedTypes?.createPolicy('riseback#pdf-worker', { createScriptURL: () => address }).createScriptURL('') ??
    address;
  return workerUrl;
}

/** A PDF whose pages can be drawn, one at a time. It stays in the browser: the server never reads one. */
export class PdfPages {
  private constructor(
    private readonly document: PDFDocumentProxy,
    private readonly worker: Worker,
  ) {}

  /** @throws whatever the reader says of a file that it cannot read; a `PasswordException` for a locked one */
  static async open(bytes: Uint8Array): Promise<PdfPages> {
    const { getDocument, PDFWorker } = await import('pdfjs-dist');
    const thread = new Worker(readerWorkerUrl() as string, { type: 'module' });
    try {
      const document = await getDocument({
        data: bytes,
        worker: PDFWorker.create({ port: thread }),
        // neither is allowed by our content security policy, and neither is needed
        isEvalSupported: false,
        useWasm: false,
        enableXfa: false,
        standardFontDataUrl: `${READER_FOLDER}standard_fonts/`,
        cMapUrl: `${READER_FOLDER}cmaps/`,
        wasmUrl: `${READER_FOLDER}wasm/`,
      }).promise;
      return new PdfPages(document, thread);
    } catch (error) {
      thread.terminate();
      throw error;
    }
  }

  get count(): number {
    return this.document.numPages;
  }

  /** Draws a page on white, as large as its longer side may be. */
  async draw(pageNumber: number, longerSidePx: number, canvas: HTMLCanvasElement): Promise<void> {
    const page = await this.document.getPage(pageNumber);
    const natural = page.getViewport({ scale: 1 });
    const viewport = page.getViewport({ scale: longerSidePx / Math.max(natural.width, natural.height) });
    canvas.width = Math.max(1, Math.round(viewport.width));
    canvas.height = Math.max(1, Math.round(viewport.height));
    await page.render({ canvas, viewport, background: '#ffffff' }).promise;
    page.cleanup();
  }

  close(): void {
    void this.document.destroy().finally(() => this.worker.terminate());
  }
}
