import { CaseOutcome, type ReportFormat } from '@riseback/contracts';
import { readNetworkFile, type NetworkFile } from '@riseback/network';
import * as z from 'zod';
import type { PreviousRevision, ReportContent, ReportProgress } from './report-content';
import { REPORT_MAKERS } from './report-makers';

/** JSON as it is stored: taken apart in the thread that makes the report, where no request waits for it. */
interface StateTexts {
  readonly fileText: string;
  readonly outcomesText: string;
}
type Texts<State extends { file: unknown; outcomes: unknown }> = Omit<State, 'file' | 'outcomes' | 'previous'> &
  StateTexts;

/** A report's content as it crosses to that thread. */
export interface ReportMaterial extends Texts<ReportContent> {
  readonly previous?: Texts<PreviousRevision>;
}

export interface ReportOrder {
  readonly format: ReportFormat;
  readonly material: ReportMaterial;
}

const Outcomes = z.array(CaseOutcome);

export async function makeReport(
  { format, material }: ReportOrder,
  progress: ReportProgress,
  signal: AbortSignal,
): Promise<Buffer> {
  progress(0.02, 'Reading the results');
  return REPORT_MAKERS[format](contentOf(material), progress, signal);
}

function contentOf({ previous, fileText, outcomesText, ...rest }: ReportMaterial): ReportContent {
  return {
    ...rest,
    ...statesOf({ fileText, outcomesText }),
    ...(previous === undefined ? {} : { previous: previousOf(previous) }),
  };
}

function previousOf({ fileText, outcomesText, ...rest }: Texts<PreviousRevision>): PreviousRevision {
  return { ...rest, ...statesOf({ fileText, outcomesText }) };
}

function statesOf({ fileText, outcomesText }: StateTexts): { file: NetworkFile; outcomes: CaseOutcome[] } {
  const read = readNetworkFile(JSON.parse(fileText));
  if (!read.ok) throw new Error(`a stored network file does not read: ${read.errors[0]?.pointer ?? ''}`);
  return { file: read.file, outcomes: Outcomes.parse(JSON.parse(outcomesText)) };
}
