import type { ReportFormat } from '@riseback/contracts';
import { makePdf } from './pdf/make-pdf';
import type { ReportMaker } from './report-content';

/** How each format is made; loaded by the report's thread only. */
export const REPORT_MAKERS: Readonly<Partial<Record<ReportFormat, ReportMaker>>> = {
  pdf: makePdf,
};
