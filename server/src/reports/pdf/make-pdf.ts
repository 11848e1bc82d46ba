import PDFDocument from 'pdfkit';
import type { ReportContent, ReportProgress } from '../report-content';

/** The calculation report as a PDF. */
export async function makePdf(content: ReportContent, progress: ReportProgress, signal: AbortSignal): Promise<Buffer> {
  progress(0.1, 'Setting the pages');
  signal.throwIfAborted();
  const doc = new PDFDocument({ size: content.paper === 'a4' ? 'A4' : 'LETTER' });
  const chunks: Buffer[] = [];
  const whole = new Promise<Buffer>((resolve, reject) => {
    doc.on('data', (chunk: Buffer) => chunks.push(chunk));
    doc.on('end', () => resolve(Buffer.concat(chunks)));
    doc.on('error', reject);
  });
  doc.text(content.networkName);
  doc.end();
  return whole;
}
