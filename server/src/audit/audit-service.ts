import type { AuditExportQuery, AuditPage, AuditQuery, AuditRecord } from '@riseback/contracts';
import * as z from 'zod';
import type { SiteAccess } from '../platform/auth/access';
import type { AuditRepository, AuditRowWithName } from './audit-repository';
import { csvLine } from './csv-line';

const Details = z.record(z.string(), z.unknown());

/** Between two looks at what else the server has to do. */
const EXPORT_PAGE_ROWS = 500;
const COLUMNS = [
  'entry',
  'time (UTC)',
  'person',
  'person id',
  'session',
  'action',
  'subject',
  'details',
  'hash before',
  'hash',
];

/** What administrators read of the log: their own site's. */
export class AuditService {
  constructor(private readonly log: AuditRepository) {}

  page(access: SiteAccess, { before, limit, ...filter }: AuditQuery): AuditPage {
    const { siteId } = access;
    // one more than asked for tells whether there is a next page
    const rows = this.log.newest(siteId, filter, before, limit + 1);
    const entries = rows.slice(0, limit).map(recordOf);
    const last = entries.at(-1);
    return {
      entries,
      ...(rows.length > limit && last !== undefined ? { nextBefore: last.seq } : {}),
      ...(before === undefined
        ? { choices: { actions: this.log.actions(siteId), people: this.log.people(siteId) } }
        : {}),
    };
  }

  /** The whole of it, oldest first, a piece at a time: it may be larger than the memory. */
  async *export(access: SiteAccess, { format, ...filter }: AuditExportQuery): AsyncGenerator<string> {
    yield format === 'csv' ? csvLine(COLUMNS) : '[';
    let first = true;
    for await (const rows of this.pages(access.siteId, filter)) {
      const lines = rows.map((row) =>
        format === 'csv' ? csvLine(cellsOf(row)) : `\n${JSON.stringify(exportedOf(row))}`,
      );
      yield format === 'csv' ? lines.join('') : `${first ? '' : ','}${lines.join(',')}`;
      first = false;
    }
    if (format === 'json') yield '\n]\n';
  }

  private async *pages(siteId: string, filter: Omit<AuditExportQuery, 'format'>): AsyncGenerator<AuditRowWithName[]> {
    for (let after = 0; ;) {
      const rows = this.log.oldest(siteId, filter, after, EXPORT_PAGE_ROWS);
      const last = rows.at(-1);
      if (last === undefined) return;
      yield rows;
      after = last.entry.seq;
      await new Promise((resolve) => setImmediate(resolve));
    }
  }
}

function recordOf({ entry, personName }: AuditRowWithName): AuditRecord {
  const { seq, at, personId, action, subject, details } = entry;
  return {
    seq,
    at,
    ...(personId === null ? {} : { personId }),
    ...(personName === null ? {} : { personName }),
    action,
    subject,
    details: Details.parse(details),
  };
}

/** With its hashes, so that the chain can be followed outside as well. */
function exportedOf(row: AuditRowWithName): AuditRecord & { previousHash: string; hash: string } {
  return { ...recordOf(row), previousHash: row.entry.previousHash, hash: row.entry.hash };
}

function cellsOf({ entry, personName }: AuditRowWithName): string[] {
  const { seq, at, personId, sessionId, action, subject, details, previousHash, hash } = entry;
  const ids = [personName ?? '', personId ?? '', sessionId ?? ''];
  return [String(seq), at, ...ids, action, subject, JSON.stringify(details), previousHash, hash];
}
