import type { ReportFormat } from '@riseback/contracts';

interface FileKind {
  readonly mediaType: string;
  readonly extension: string;
}

export const FILE_KINDS: Readonly<Record<ReportFormat, FileKind>> = {
  pdf: { mediaType: 'application/pdf', extension: 'pdf' },
  xlsx: { mediaType: 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet', extension: 'xlsx' },
  // a table a file, so that several travel as one
  csv: { mediaType: 'application/zip', extension: 'zip' },
  json: { mediaType: 'application/json', extension: 'json' },
};

/** A name that every system takes, whatever the network is called. */
export function reportFileName(networkName: string, letter: string | undefined, format: ReportFormat): string {
  const state = letter === undefined ? 'working' : `revision-${plain(letter)}`;
  const network = plain(networkName);
  return `${network === '' ? 'network' : network}-${state}.${FILE_KINDS[format].extension}`;
}

function plain(text: string): string {
  return text
    .normalize('NFKD')
    .replaceAll(/\p{Mark}/gu, '')
    .replaceAll(/[^A-Za-z0-9]+/g, '-')
    .replaceAll(/^-+|-+$/g, '')
    .slice(0, 80);
}
