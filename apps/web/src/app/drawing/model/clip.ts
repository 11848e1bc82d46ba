import {
  emptyDocument,
  fromFile,
  layoutMissingPositions,
  type NetworkDocument,
  type Placed,
  readNetworkFile,
  toFile,
  type TrapModel,
} from '@riseback/network';

/** Says in a text of the clipboard that it is a piece of a drawing. */
const MARKER = 'riseback-piece';
const VERSION = 1;
/** A text longer than this came from nowhere here; about 60,000 elements. */
const LONGEST_TEXT = 32e6;

/** A part of a network on its way to another place, or another network. */
export interface Clip {
  /** Nodes, the pipes between them and the trap models they name. */
  readonly part: NetworkDocument;
  /** Its models' ties to a library hold at this site only. */
  readonly siteId: string;
  /** Cut out: what is put in first keeps its tags, since nothing else has them now. */
  readonly cut: boolean;
}

export interface CopiedPart {
  readonly part: NetworkDocument;
  readonly nodes: number;
  readonly pipes: number;
  /** Selected pipes, and pipes of selected nodes, whose other end is not selected. */
  readonly leftBehind: number;
}

export type ReadClip = { readonly ok: true; readonly clip: Clip } | { readonly ok: false; readonly why: string };

/** The nodes of a selection, the pipes that have both ends among them and the trap models that they name. */
export function partOf(document: NetworkDocument, ids: ReadonlySet<string>): CopiedPart {
  const nodes = pick(document.nodes, (id) => ids.has(id));
  const pipes = pick(document.pipes, (_, { from, to }) => nodes.has(from) && nodes.has(to));
  const named = new Set([...nodes.values()].flatMap(({ value }) => (value.kind === 'trap' ? [value.trapModel] : [])));
  const leftBehind = pick(
    document.pipes,
    (id, { from, to }) => !pipes.has(id) && (ids.has(id) || nodes.has(from) || nodes.has(to)),
  ).size;
  return {
    part: {
      ...emptyDocument(document.name, document.site),
      nodes,
      pipes,
      trapModels: pick(document.trapModels, (id) => named.has(id)),
    },
    nodes: nodes.size,
    pipes: pipes.size,
    leftBehind,
  };
}

/** A clip as text: a network file in an envelope, so that it is read with the care that a file is read with. */
export function clipText({ part, siteId, cut }: Clip): string {
  const library = [...part.trapModels].flatMap(
    ([
      id,
      {
        value: { libraryId, libraryVersion },
      },
    ]) =>
      libraryId === undefined || libraryVersion === undefined ? [] : [[id, { libraryId, libraryVersion }] as const],
  );
  return JSON.stringify({
    format: MARKER,
    version: VERSION,
    siteId,
    cut,
    network: toFile(part),
    library: Object.fromEntries(library),
  });
}

/** Reads whatever the clipboard holds. Never throws; a text that is no piece of a drawing is told from a damaged one. */
export function readClip(text: string): ReadClip {
  const envelope = text.length > LONGEST_TEXT || !text.includes(MARKER) ? null : parsed(text);
  if (envelope?.['format'] !== MARKER) {
    return { ok: false, why: 'The clipboard holds nothing that was copied from a drawing' };
  }
  if (envelope['version'] !== VERSION) {
    return { ok: false, why: 'The clipboard holds a piece of a drawing from another version of the program' };
  }
  const read = readNetworkFile(envelope['network']);
  if (!read.ok) {
    const [mistake] = read.errors;
    return {
      ok: false,
      why: `The piece in the clipboard is damaged${mistake === undefined ? '' : `: ${mistake.detail}`}`,
    };
  }
  const part = layoutMissingPositions(fromFile(read.file));
  const siteId = typeof envelope['siteId'] === 'string' ? envelope['siteId'] : '';
  return {
    ok: true,
    clip: {
      part: {
        ...emptyDocument(part.name, part.site),
        nodes: part.nodes,
        pipes: part.pipes,
        trapModels: tied(part.trapModels, envelope['library']),
      },
      siteId,
      cut: envelope['cut'] === true,
    },
  };
}

function parsed(text: string): Readonly<Record<string, unknown>> | null {
  try {
    return asRecord(JSON.parse(text));
  } catch {
    return null;
  }
}

/** Models with the library models that they are copies of; a tie that is no tie is passed over. */
function tied(models: NetworkDocument['trapModels'], library: unknown): Map<string, Placed<TrapModel>> {
  const ties = asRecord(library);
  return new Map(
    [...models].map(([id, { ordinal, value }]) => {
      const tie = asRecord(ties !== null && Object.hasOwn(ties, id) ? ties[id] : null);
      const [libraryId, libraryVersion] = [tie?.['libraryId'], tie?.['libraryVersion']];
      const whole = typeof libraryId === 'string' && typeof libraryVersion === 'number';
      return [id, { ordinal, value: whole ? { ...value, libraryId, libraryVersion } : value }];
    }),
  );
}

function asRecord(value: unknown): Readonly<Record<string, unknown>> | null {
  return typeof value === 'object' && value !== null && !Array.isArray(value)
    ? (value as Readonly<Record<string, unknown>>)
    : null;
}

function pick<T>(
  collection: ReadonlyMap<string, Placed<T>>,
  wanted: (id: string, value: T) => boolean,
): Map<string, Placed<T>> {
  return new Map([...collection].filter(([id, { value }]) => wanted(id, value)));
}
