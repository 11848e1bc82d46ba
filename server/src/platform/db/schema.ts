import type { ImageType, Person, Role } from '@riseback/contracts';
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
