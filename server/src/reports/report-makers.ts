import type { ReportFormat } from '@riseback/contracts';
import { makeCsv } from './exports/make-csv';
import { makeJson } from './exports/make-json';
import { makeXlsx } from './exports/make-xlsx';
import { makePdf } from './pdf/make-pdf';
import type { ReportMaker } from './report-content';

/** How each format is made; loaded by the report's thread only. */
export const REPORT_MAKERS: Readonly<Record<ReportFormat, ReportMaker>> = {
  pdf: makePdf,
  xlsx: makeXlsx,
  csv: makeCsv,
  json: makeJson,
};
