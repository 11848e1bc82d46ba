import type {
  DeclinableMail,
  ImageType,
  JobState,
  LinkPurpose,
  MailPurpose,
  MailState,
  Person,
  ReportFormat,
  RevisionState,
  Role,
  SignatureMeaning,
  WhyNotRead,
} from '@riseback/contracts';
import type { NodeKind } from '@riseback/network';
import { sql } from 'drizzle-orm';
import {
  blob,
  check,
  foreignKey,
  index,
  integer,
  primaryKey,
  real,
  sqliteTable,
  text,
  uniqueIndex,
} from 'drizzle-orm/sqlite-core';

/*
 * Every table reaches its site by foreign keys. Times are UTC text from the injected clock, numbers are SI with the unit
 * in the name, NULL means that the key is absent. Tables are STRICT: db-generate adds that to what drizzle-kit writes.
 * Checks name their columns without the table, since a rebuilt table bears another name while it is filled.
 */

/**
 * The list of all members of a union; the compiler refuses one too few or too many. drizzle-kit loads this file without
 * the means to load the libraries, so that their lists are repeated here.
 */
const allOf =
  <Member extends string>() =>
  <const List extends readonly [Member, ...Member[]]>(list: [Member] extends [List[number]] ? List : never): List =>
    list;

const ROLES = allOf<Role>()(['viewer', 'commissioning', 'designer', 'reviewer', 'administrator']);
const UNIT_SYSTEMS = allOf<Person['units']>()(['us', 'si']);
const THEMES = allOf<Person['theme']>()(['system', 'light', 'dark']);
const NODE_KINDS = allOf<NodeKind>()(['trap', 'junction', 'flashVessel', 'pumpedInlet', 'receiver']);
const IMAGE_TYPES = allOf<ImageType>()(['image/png', 'image/jpeg']);
const FILE_PURPOSES = ['plan'] as const;
const SESSION_ENDS = ['signedOut', 'endedByOwner', 'passwordChanged', 'roleChanged', 'disabled', 'expired'] as const;
const SOLVE_STATES = ['finished', 'failed'] as const;
const REVISION_STATES = allOf<RevisionState>()([
  'draft',
  'underReview',
  'returned',
  'approved',
  'superseded',
  'withdrawn',
]);
const SIGNATURE_MEANINGS = allOf<SignatureMeaning>()(['reviewed', 'approved']);
const LINK_PURPOSES = allOf<LinkPurpose>()(['invitation', 'passwordReset']);
const MAIL_PURPOSES = allOf<MailPurpose>()([
  'invitation',
  'passwordReset',
  'submitted',
  'returned',
  'approved',
  'mention',
  'comment',
]);
const DECLINABLE_MAILS = allOf<DeclinableMail>()(['submitted', 'returned', 'approved', 'mention', 'comment']);
const MAIL_STATES = allOf<MailState>()(['waiting', 'sent', 'givenUp']);
const JOB_KINDS = ['report'] as const;
const JOB_STATES = allOf<JobState>()(['waiting', 'running', 'finished', 'failed', 'cancelled']);
const REPORT_FORMATS = allOf<ReportFormat>()(['pdf', 'xlsx', 'csv', 'json']);
const WHY_NOT_READ = allOf<WhyNotRead>()(['noAccess', 'unsafe', 'notFound', 'shutOff', 'broken', 'other']);

const oneOf = (name: string, column: string, values: readonly string[]) =>
  check(name, sql.raw(`${column} in (${values.map((value) => `'${value}'`).join(', ')})`));
const isJson = (name: string, column: string) => check(name, sql.raw(`json_valid(${column})`));
/** JSON text; comes out as `unknown` and is parsed by the one zod schema of its column. */
const json = (column: string) => text(column, { mode: 'json' });

export const people = sqliteTable(
  'people',
  {
    id: text('id').primaryKey(),
    email: text('email').notNull(),
    name: text('name').notNull(),
    passwordHash: text('password_hash').notNull(),
    passwordChangedAt: text('password_changed_at').notNull(),
    units: text('units', { enum: UNIT_SYSTEMS }).notNull(),
    theme: text('theme', { enum: THEMES }).notNull(),
    timeZone: text('time_zone').notNull(),
    administersInstallation: integer('administers_installation', { mode: 'boolean' }).notNull().default(false),
    disabledAt: text('disabled_at'),
    createdAt: text('created_at').notNull(),
  },
  () => [
    uniqueIndex('people_email').on(sql`lower(email)`),
    oneOf('people_units', 'units', UNIT_SYSTEMS),
    oneOf('people_theme', 'theme', THEMES),
    check('people_administers_installation', sql.raw('administers_installation in (0, 1)')),
  ],
);

export const sessions = sqliteTable(
  'sessions',
  {
    id: text('id').primaryKey(),
    personId: text('person_id')
      .notNull()
      .references(() => people.id),
    createdAt: text('created_at').notNull(),
    seenAt: text('seen_at').notNull(),
    idleUntil: text('idle_until').notNull(),
    endsAt: text('ends_at').notNull(),
    endedAt: text('ended_at'),
    endedWhy: text('ended_why', { enum: SESSION_ENDS }),
    agent: text('agent').notNull(),
  },
  (table) => [index('sessions_person').on(table.personId), oneOf('sessions_ended_why', 'ended_why', SESSION_ENDS)],
);

/** What a person's one-time codes are made of, sealed. Without `confirmed_at` no code has shown yet that somebody holds it. */
export const oneTimeSecrets = sqliteTable('one_time_secrets', {
  personId: text('person_id')
    .primaryKey()
    .references(() => people.id),
  sealedSecret: text('sealed_secret').notNull(),
  createdAt: text('created_at').notNull(),
  confirmedAt: text('confirmed_at'),
  /** The half-minute of the last code that was taken: none of it or before is taken again. */
  lastStep: integer('last_step'),
});

/** Codes for who has lost what makes the others; each counts once. */
export const recoveryCodes = sqliteTable(
  'recovery_codes',
  {
    personId: text('person_id')
      .notNull()
      .references(() => people.id),
    codeHash: text('code_hash').notNull(),
    createdAt: text('created_at').notNull(),
    usedAt: text('used_at'),
  },
  (table) => [primaryKey({ columns: [table.personId, table.codeHash] })],
);

export const sites = sqliteTable(
  'sites',
  {
    id: text('id').primaryKey(),
    name: text('name').notNull(),
    atmosphericPressurePa: real('atmospheric_pressure_pa').notNull(),
    ambientTemperatureK: real('ambient_temperature_k').notNull(),
    limits: json('limits').notNull(),
    tagPattern: text('tag_pattern'),
    createdAt: text('created_at').notNull(),
  },
  () => [isJson('sites_limits', 'limits')],
);

export const memberships = sqliteTable(
  'memberships',
  {
    personId: text('person_id')
      .notNull()
      .references(() => people.id),
    siteId: text('site_id')
      .notNull()
      .references(() => sites.id),
    role: text('role', { enum: ROLES }).notNull(),
    grantedBy: text('granted_by').references(() => people.id),
    grantedAt: text('granted_at').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.personId, table.siteId] }),
    index('memberships_site').on(table.siteId),
    oneOf('memberships_role', 'role', ROLES),
  ],
);

export const networks = sqliteTable(
  'networks',
  {
    id: text('id').primaryKey(),
    siteId: text('site_id')
      .notNull()
      .references(() => sites.id),
    name: text('name').notNull(),
    version: integer('version').notNull(),
    conditions: json('conditions').notNull(),
    method: json('method').notNull(),
    limits: json('limits').notNull(),
    solverHash: text('solver_hash').notNull(),
    createdBy: text('created_by')
      .notNull()
      .references(() => people.id),
    createdAt: text('created_at').notNull(),
    archivedAt: text('archived_at'),
  },
  (table) => [
    index('networks_site').on(table.siteId),
    isJson('networks_conditions', 'conditions'),
    isJson('networks_method', 'method'),
    isJson('networks_limits', 'limits'),
  ],
);

/** Columns that the tables of elements share; keys of an element that have no column of their own are in `properties`. */
const element = {
  networkId: text('network_id')
    .notNull()
    .references(() => networks.id),
  ordinal: integer('ordinal').notNull(),
  changedIn: integer('changed_in').notNull(),
  properties: json('properties').notNull(),
};

export const nodes = sqliteTable(
  'nodes',
  {
    ...element,
    id: text('id').notNull(),
    kind: text('kind', { enum: NODE_KINDS }).notNull(),
    tag: text('tag'),
    elevationM: real('elevation_m').notNull(),
    x: real('x'),
    y: real('y'),
  },
  (table) => [
    primaryKey({ columns: [table.networkId, table.id] }),
    oneOf('nodes_kind', 'kind', NODE_KINDS),
    isJson('nodes_properties', 'properties'),
  ],
);

export const pipes = sqliteTable(
  'pipes',
  {
    ...element,
    id: text('id').notNull(),
    tag: text('tag'),
    from: text('from_node').notNull(),
    to: text('to_node').notNull(),
    lengthM: real('length_m').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.networkId, table.id] }),
    foreignKey({
      name: 'pipes_from',
      columns: [table.networkId, table.from],
      foreignColumns: [nodes.networkId, nodes.id],
    }),
    foreignKey({ name: 'pipes_to', columns: [table.networkId, table.to], foreignColumns: [nodes.networkId, nodes.id] }),
    index('pipes_from_node').on(table.networkId, table.from),
    index('pipes_to_node').on(table.networkId, table.to),
    isJson('pipes_properties', 'properties'),
  ],
);

/** The network's own copies of trap models; `library*` say where a copy came from. */
export const trapModels = sqliteTable(
  'trap_models',
  {
    ...element,
    id: text('id').notNull(),
    name: text('name').notNull(),
    libraryId: text('library_id'),
    libraryVersion: integer('library_version'),
  },
  (table) => [primaryKey({ columns: [table.networkId, table.id] }), isJson('trap_models_properties', 'properties')],
);

/** A site's trap models: one row a version, never changed (by trigger), so that a network can name the one it copied. */
export const libraryModels = sqliteTable(
  'library_models',
  {
    siteId: text('site_id')
      .notNull()
      .references(() => sites.id),
    id: text('id').notNull(),
    version: integer('version').notNull(),
    name: text('name').notNull(),
    properties: json('properties').notNull(),
    createdBy: text('created_by')
      .notNull()
      .references(() => people.id),
    createdAt: text('created_at').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.siteId, table.id, table.version] }),
    isJson('library_models_properties', 'properties'),
  ],
);

export const cases = sqliteTable(
  'cases',
  { ...element, id: text('id').notNull(), name: text('name').notNull() },
  (table) => [primaryKey({ columns: [table.networkId, table.id] }), isJson('cases_properties', 'properties')],
);

export const caseOverrides = sqliteTable(
  'case_overrides',
  { ...element, caseId: text('case_id').notNull(), node: text('node_id').notNull() },
  (table) => [
    primaryKey({ columns: [table.networkId, table.caseId, table.node] }),
    foreignKey({
      name: 'case_overrides_case',
      columns: [table.networkId, table.caseId],
      foreignColumns: [cases.networkId, cases.id],
    }),
    foreignKey({
      name: 'case_overrides_node',
      columns: [table.networkId, table.node],
      foreignColumns: [nodes.networkId, nodes.id],
    }),
    index('case_overrides_node_id').on(table.networkId, table.node),
    isJson('case_overrides_properties', 'properties'),
  ],
);

export const gauges = sqliteTable(
  'gauges',
  {
    ...element,
    id: text('id').notNull(),
    tag: text('tag'),
    node: text('node_id'),
    pipe: text('pipe_id'),
    distanceM: real('distance_m'),
  },
  (table) => [
    primaryKey({ columns: [table.networkId, table.id] }),
    foreignKey({
      name: 'gauges_node',
      columns: [table.networkId, table.node],
      foreignColumns: [nodes.networkId, nodes.id],
    }),
    foreignKey({
      name: 'gauges_pipe',
      columns: [table.networkId, table.pipe],
      foreignColumns: [pipes.networkId, pipes.id],
    }),
    check('gauges_place', sql.raw('(node_id is null) <> (pipe_id is null)')),
    isJson('gauges_properties', 'properties'),
  ],
);

/** What came in as a file, with its bytes; `name` is only shown. */
export const files = sqliteTable(
  'files',
  {
    id: text('id').primaryKey(),
    siteId: text('site_id')
      .notNull()
      .references(() => sites.id),
    purpose: text('purpose', { enum: FILE_PURPOSES }).notNull(),
    name: text('name').notNull(),
    mediaType: text('media_type', { enum: IMAGE_TYPES }).notNull(),
    sizeBytes: integer('size_bytes').notNull(),
    sha256: text('sha256').notNull(),
    content: blob('content', { mode: 'buffer' }).notNull(),
    createdBy: text('created_by')
      .notNull()
      .references(() => people.id),
    createdAt: text('created_at').notNull(),
  },
  (table) => [
    index('files_site').on(table.siteId),
    oneOf('files_purpose', 'purpose', FILE_PURPOSES),
    oneOf('files_media_type', 'media_type', IMAGE_TYPES),
    check('files_size_bytes', sql.raw('size_bytes = length(content)')),
  ],
);

/** What lies under a drawing, and where. Without a file the plan was taken away; the row stays, so that versions go on. */
export const plans = sqliteTable('plans', {
  networkId: text('network_id')
    .primaryKey()
    .references(() => networks.id),
  version: integer('version').notNull(),
  fileId: text('file_id').references(() => files.id),
  x: real('x').notNull(),
  y: real('y').notNull(),
  unitsPerPixel: real('units_per_pixel').notNull(),
  metresPerUnit: real('metres_per_unit'),
  opacity: real('opacity').notNull(),
  widthPx: integer('width_px').notNull(),
  heightPx: integer('height_px').notNull(),
});

/** Every accepted batch, for ever; version 1 is the creation. `solver_hash` is the network's after it. */
export const edits = sqliteTable(
  'edits',
  {
    networkId: text('network_id')
      .notNull()
      .references(() => networks.id),
    version: integer('version').notNull(),
    batchId: text('batch_id').notNull(),
    personId: text('person_id')
      .notNull()
      .references(() => people.id),
    at: text('at').notNull(),
    label: text('label').notNull(),
    forward: json('forward').notNull(),
    inverse: json('inverse').notNull(),
    solverHash: text('solver_hash').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.networkId, table.version] }),
    uniqueIndex('edits_batch').on(table.batchId),
    isJson('edits_forward', 'forward'),
    isJson('edits_inverse', 'inverse'),
  ],
);

/** Solves that have ended. Those under way are in memory only, so that a killed server leaves none behind half-done. */
export const solves = sqliteTable(
  'solves',
  {
    id: text('id').primaryKey(),
    networkId: text('network_id')
      .notNull()
      .references(() => networks.id),
    solverHash: text('solver_hash').notNull(),
    engineVersion: text('engine_version').notNull(),
    state: text('state', { enum: SOLVE_STATES }).notNull(),
    startedAt: text('started_at').notNull(),
    finishedAt: text('finished_at').notNull(),
    problem: json('problem'),
    summary: json('summary'),
  },
  (table) => [
    uniqueIndex('solves_input').on(table.networkId, table.solverHash, table.engineVersion),
    oneOf('solves_state', 'state', SOLVE_STATES),
    isJson('solves_problem', 'problem'),
    isJson('solves_summary', 'summary'),
  ],
);

/** One row a case; `case_id` '' is the plain network. */
export const solveResults = sqliteTable(
  'solve_results',
  {
    solveId: text('solve_id')
      .notNull()
      .references(() => solves.id),
    caseId: text('case_id').notNull(),
    ordinal: integer('ordinal').notNull(),
    converged: integer('converged', { mode: 'boolean' }).notNull(),
    result: json('result').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.solveId, table.caseId] }),
    check('solve_results_converged', sql.raw('converged in (0, 1)')),
    isJson('solve_results_result', 'result'),
  ],
);

/** Append-only by trigger and chained by hash (audit.ts). */
export const audit = sqliteTable(
  'audit',
  {
    seq: integer('seq').primaryKey(),
    at: text('at').notNull(),
    personId: text('person_id').references(() => people.id),
    sessionId: text('session_id').references(() => sessions.id),
    siteId: text('site_id').references(() => sites.id),
    action: text('action').notNull(),
    subject: text('subject').notNull(),
    details: json('details').notNull(),
    previousHash: text('previous_hash').notNull(),
    hash: text('hash').notNull(),
  },
  (table) => [index('audit_site').on(table.siteId), isJson('audit_details', 'details')],
);

/**
 * A network as it stood at one version, frozen with the results of all its cases; never changed, by trigger. What became of it is in
 * `revision_events`. `file` is the RFC 8785 text whose SHA-256 is `file_hash`.
 */
export const revisions = sqliteTable(
  'revisions',
  {
    id: text('id').primaryKey(),
    networkId: text('network_id')
      .notNull()
      .references(() => networks.id),
    letter: text('letter').notNull(),
    title: text('title').notNull(),
    reason: text('reason').notNull(),
    networkVersion: integer('network_version').notNull(),
    file: text('file').notNull(),
    fileHash: text('file_hash').notNull(),
    solverHash: text('solver_hash').notNull(),
    resultsHash: text('results_hash').notNull(),
    engineVersion: text('engine_version').notNull(),
    createdBy: text('created_by')
      .notNull()
      .references(() => people.id),
    createdAt: text('created_at').notNull(),
  },
  (table) => [
    uniqueIndex('revisions_letter').on(table.networkId, table.letter),
    foreignKey({
      name: 'revisions_version',
      columns: [table.networkId, table.networkVersion],
      foreignColumns: [edits.networkId, edits.version],
    }),
    isJson('revisions_file', 'file'),
  ],
);

/** One row a case, RFC 8785 text; `case_id` '' is the plain network. Never changed, by trigger. */
export const revisionResults = sqliteTable(
  'revision_results',
  {
    revisionId: text('revision_id')
      .notNull()
      .references(() => revisions.id),
    caseId: text('case_id').notNull(),
    ordinal: integer('ordinal').notNull(),
    result: text('result').notNull(),
  },
  (table) => [primaryKey({ columns: [table.revisionId, table.caseId] }), isJson('revision_results_result', 'result')],
);

/** What became of a revision; its state is the last row's. Append-only by trigger. */
export const revisionEvents = sqliteTable(
  'revision_events',
  {
    revisionId: text('revision_id')
      .notNull()
      .references(() => revisions.id),
    seq: integer('seq').notNull(),
    state: text('state', { enum: REVISION_STATES }).notNull(),
    personId: text('person_id')
      .notNull()
      .references(() => people.id),
    at: text('at').notNull(),
    note: text('note').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.revisionId, table.seq] }),
    oneOf('revision_events_state', 'state', REVISION_STATES),
  ],
);

/** Ed25519 over `statement`, an RFC 8785 text; the key lies outside the database. Append-only by trigger. */
export const signatures = sqliteTable(
  'signatures',
  {
    revisionId: text('revision_id')
      .notNull()
      .references(() => revisions.id),
    seq: integer('seq').notNull(),
    personId: text('person_id')
      .notNull()
      .references(() => people.id),
    meaning: text('meaning', { enum: SIGNATURE_MEANINGS }).notNull(),
    statement: text('statement').notNull(),
    statementHash: text('statement_hash').notNull(),
    /** `seq hash` of the log's last row when it was signed. */
    auditHead: text('audit_head').notNull(),
    /** Base64. */
    signature: text('signature').notNull(),
    /** SHA-256 of the public key in DER, which tells keys apart. */
    keyId: text('key_id').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.revisionId, table.seq] }),
    oneOf('signatures_meaning', 'meaning', SIGNATURE_MEANINGS),
    isJson('signatures_statement', 'statement'),
  ],
);

/** A thread is its first comment (`thread_id` = its own id) and the answers to it; only a first comment is resolved. */
export const comments = sqliteTable(
  'comments',
  {
    id: text('id').primaryKey(),
    networkId: text('network_id')
      .notNull()
      .references(() => networks.id),
    /** Absent: on the network as it stands. */
    revisionId: text('revision_id').references(() => revisions.id),
    threadId: text('thread_id').notNull(),
    subject: json('subject').notNull(),
    personId: text('person_id')
      .notNull()
      .references(() => people.id),
    at: text('at').notNull(),
    body: text('body').notNull(),
    /** Ids of the people it names. */
    mentions: json('mentions').notNull(),
    resolvedBy: text('resolved_by').references(() => people.id),
    resolvedAt: text('resolved_at'),
  },
  (table) => [
    index('comments_network').on(table.networkId, table.revisionId),
    index('comments_thread').on(table.threadId),
    isJson('comments_subject', 'subject'),
    isJson('comments_mentions', 'mentions'),
  ],
);

/** Invitations and resets. The link itself is made anew from the id and a secret when its mail is sent; here is only what tells it. */
export const oneTimeLinks = sqliteTable(
  'one_time_links',
  {
    id: text('id').primaryKey(),
    tokenHash: text('token_hash').notNull(),
    purpose: text('purpose', { enum: LINK_PURPOSES }).notNull(),
    email: text('email').notNull(),
    /** Of an invitation. */
    siteId: text('site_id').references(() => sites.id),
    role: text('role', { enum: ROLES }),
    /** Absent where the person asked for it themselves. */
    madeBy: text('made_by').references(() => people.id),
    madeAt: text('made_at').notNull(),
    expiresAt: text('expires_at').notNull(),
    usedAt: text('used_at'),
    withdrawnAt: text('withdrawn_at'),
  },
  (table) => [
    uniqueIndex('one_time_links_token').on(table.tokenHash),
    index('one_time_links_site').on(table.siteId),
    oneOf('one_time_links_purpose', 'purpose', LINK_PURPOSES),
    oneOf('one_time_links_role', 'role', ROLES),
  ],
);

/** The outbox: written in the transaction that causes the mail, sent by and by. `id` is the local part of its Message-ID. */
export const mails = sqliteTable(
  'mails',
  {
    id: text('id').primaryKey(),
    purpose: text('purpose', { enum: MAIL_PURPOSES }).notNull(),
    siteId: text('site_id').references(() => sites.id),
    /** Absent for who has no account yet. */
    recipientId: text('recipient_id').references(() => people.id),
    email: text('email').notNull(),
    data: json('data').notNull(),
    state: text('state', { enum: MAIL_STATES }).notNull(),
    attempts: integer('attempts').notNull(),
    nextTryAt: text('next_try_at').notNull(),
    createdAt: text('created_at').notNull(),
    sentAt: text('sent_at'),
    lastError: text('last_error'),
  },
  (table) => [
    index('mails_due').on(table.state, table.nextTryAt),
    index('mails_site').on(table.siteId, table.createdAt),
    oneOf('mails_purpose', 'purpose', MAIL_PURPOSES),
    oneOf('mails_state', 'state', MAIL_STATES),
    isJson('mails_data', 'data'),
  ],
);

/** What a person asked not to be written about. */
export const declinedMails = sqliteTable(
  'declined_mails',
  {
    personId: text('person_id')
      .notNull()
      .references(() => people.id),
    purpose: text('purpose', { enum: DECLINABLE_MAILS }).notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.personId, table.purpose] }),
    oneOf('declined_mails_purpose', 'purpose', DECLINABLE_MAILS),
  ],
);

/** Long work, taken up once again after a restart. */
export const jobs = sqliteTable(
  'jobs',
  {
    id: text('id').primaryKey(),
    kind: text('kind', { enum: JOB_KINDS }).notNull(),
    siteId: text('site_id')
      .notNull()
      .references(() => sites.id),
    networkId: text('network_id')
      .notNull()
      .references(() => networks.id),
    personId: text('person_id')
      .notNull()
      .references(() => people.id),
    input: json('input').notNull(),
    state: text('state', { enum: JOB_STATES }).notNull(),
    /** Share done, 0 to 1, and what is being done. */
    progress: real('progress').notNull(),
    doing: text('doing').notNull(),
    attempt: integer('attempt').notNull(),
    createdAt: text('created_at').notNull(),
    startedAt: text('started_at'),
    finishedAt: text('finished_at'),
    problem: json('problem'),
  },
  (table) => [
    index('jobs_network').on(table.networkId, table.createdAt),
    index('jobs_state').on(table.state),
    oneOf('jobs_kind', 'kind', JOB_KINDS),
    oneOf('jobs_state', 'state', JOB_STATES),
    isJson('jobs_input', 'input'),
    isJson('jobs_problem', 'problem'),
  ],
);

/** The file that a report's job made; swept after a day, since it can be made again. */
export const reportFiles = sqliteTable(
  'report_files',
  {
    jobId: text('job_id')
      .primaryKey()
      .references(() => jobs.id),
    format: text('format', { enum: REPORT_FORMATS }).notNull(),
    name: text('name').notNull(),
    sha256: text('sha256').notNull(),
    content: blob('content', { mode: 'buffer' }).notNull(),
    createdAt: text('created_at').notNull(),
  },
  () => [oneOf('report_files_format', 'format', REPORT_FORMATS)],
);

/** Readings of a network's gauges taken together in one case ('' is the plain network). Only its closing changes it, once, by trigger. */
export const rounds = sqliteTable(
  'rounds',
  {
    id: text('id').primaryKey(),
    networkId: text('network_id')
      .notNull()
      .references(() => networks.id),
    networkVersion: integer('network_version').notNull(),
    caseId: text('case_id').notNull(),
    title: text('title').notNull(),
    personId: text('person_id')
      .notNull()
      .references(() => people.id),
    startedAt: text('started_at').notNull(),
    closedAt: text('closed_at'),
  },
  (table) => [
    index('rounds_network').on(table.networkId, table.startedAt),
    foreignKey({
      name: 'rounds_version',
      columns: [table.networkId, table.networkVersion],
      foreignColumns: [edits.networkId, edits.version],
    }),
  ],
);

/** What a gauge showed, or why it could not be read. A correction is a row that names the one it replaces. Append-only by trigger. */
export const readings = sqliteTable(
  'readings',
  {
    id: text('id').primaryKey(),
    roundId: text('round_id')
      .notNull()
      .references(() => rounds.id),
    gaugeId: text('gauge_id').notNull(),
    /** The gauge as it was when it was read. */
    gauge: json('gauge').notNull(),
    valuePa: real('value_pa'),
    whyNot: text('why_not', { enum: WHY_NOT_READ }),
    note: text('note').notNull(),
    takenAt: text('taken_at').notNull(),
    receivedAt: text('received_at').notNull(),
    deviceId: text('device_id').notNull(),
    deviceSeq: integer('device_seq').notNull(),
    replaces: text('replaces'),
    personId: text('person_id')
      .notNull()
      .references(() => people.id),
  },
  (table) => [
    uniqueIndex('readings_device').on(table.deviceId, table.deviceSeq),
    uniqueIndex('readings_replaces').on(table.replaces),
    index('readings_round').on(table.roundId),
    foreignKey({ name: 'readings_replaced', columns: [table.replaces], foreignColumns: [table.id] }),
    check('readings_value', sql.raw('(value_pa is null) <> (why_not is null)')),
    oneOf('readings_why_not', 'why_not', WHY_NOT_READ),
    isJson('readings_gauge', 'gauge'),
  ],
);

/** Photographs beside a reading, with their bytes. Append-only by trigger. */
export const readingPhotos = sqliteTable(
  'reading_photos',
  {
    id: text('id').primaryKey(),
    readingId: text('reading_id')
      .notNull()
      .references(() => readings.id),
    mediaType: text('media_type', { enum: IMAGE_TYPES }).notNull(),
    sha256: text('sha256').notNull(),
    content: blob('content', { mode: 'buffer' }).notNull(),
    createdAt: text('created_at').notNull(),
  },
  (table) => [
    index('reading_photos_reading').on(table.readingId),
    oneOf('reading_photos_media_type', 'media_type', IMAGE_TYPES),
  ],
);
