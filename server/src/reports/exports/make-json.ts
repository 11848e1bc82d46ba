import type { PreviousRevision, ReportContent, ReportMaker } from '../report-content';
import { reportStanding } from './report-standing';

/** docs/report-file.md tells its keys. */
export const REPORT_FORMAT = 'riseback-report';
export const REPORT_FORMAT_VERSION = 1;

/** Everything in SI, as the network file and the results have it: for programs, whatever the reader's units. */
export const makeJson: ReportMaker = (content, progress) => {
  progress(0.3, 'Writing the file');
  return Promise.resolve(Buffer.from(`${JSON.stringify(reportObject(content), null, 2)}\n`, 'utf8'));
};

function reportObject(content: ReportContent): object {
  const { siteName, networkName, madeAt, state, file, fileHash, solverHash, engineVersion, outcomes, previous } =
    content;
  const { provisional, words } = reportStanding(content);
  return {
    format: REPORT_FORMAT,
    version: REPORT_FORMAT_VERSION,
    madeAt,
    site: siteName,
    name: networkName,
    standing: { provisional, words },
    state,
    hashes: {
      file: fileHash,
      solver: solverHash,
      ...(state.kind === 'revision' ? { results: state.resultsHash } : {}),
    },
    engineVersion,
    network: file,
    outcomes,
    ...(previous === undefined ? {} : { previous: previousObject(previous) }),
  };
}

function previousObject({ letter, title, state, createdAt, engineVersion, file, outcomes }: PreviousRevision): object {
  return { letter, title, state, createdAt, engineVersion, network: file, outcomes };
}
