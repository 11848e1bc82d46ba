import { Gauge } from '@riseback/network';
import * as z from 'zod';
import { visible, visibleLines } from './visible-text';

/** Why a gauge could not be read. */
export const WHY_NOT_READ = ['noAccess', 'unsafe', 'notFound', 'shutOff', 'broken', 'other'] as const;
export const WhyNotRead = z.enum(WHY_NOT_READ);
export type WhyNotRead = z.infer<typeof WhyNotRead>;

/** Photographs taken beside a reading, as the browser sends them once it has made them smaller. */
export const PHOTO_LIMITS = { bytes: 2 * 1024 * 1024, pixels: 24_000_000, sidePx: 10_000, ofAReading: 4 } as const;

const Id = z.uuid();
/** Path of PUT and GET …/readings/:readingId/photos/:photoId; the id is made on the device, and sent twice it is one photograph. */
export const PhotoPath = z.object({ readingId: z.string().min(1).max(64), photoId: Id });

/**
 * Body of POST /api/networks/:networkId/rounds. The id is made on the device, so that a round begun without a signal has one; sent twice,
 * it is one round.
 */
export const NewRound = z.strictObject({
  id: Id,
  /** The version that was read against, and the case in which the plant was run; '' is the plain network. */
  networkVersion: z.number().int().positive(),
  caseId: z.string().max(64),
  title: visible(120).default(''),
  startedAt: z.iso.datetime(),
});
export type NewRound = z.infer<typeof NewRound>;

/**
 * Body of POST …/rounds/:roundId/readings, with its id in `Idempotency-Key` too: sent any number of times, it is stored once. What the
 * dial showed, gauge pressure; or why it could not be read. A correction is a reading that replaces another; the former stays.
 */
export const NewReading = z
  .strictObject({
    id: Id,
    gaugeId: z.string().min(1).max(64),
    /** Gauge pressure as it stood on the dial, uncorrected. */
    valuePa: z.number().min(-1e6).max(1e8).optional(),
    whyNot: WhyNotRead.optional(),
    note: visibleLines(1_000).default(''),
    takenAt: z.iso.datetime(),
    /** Made once on each device; with the number it tells the order in which readings were taken there. */
    deviceId: Id,
    deviceSeq: z.number().int().positive(),
    replaces: Id.optional(),
  })
  .refine(({ valuePa, whyNot }) => (valuePa === undefined) !== (whyNot === undefined), {
    error: 'give either valuePa or whyNot',
  });
export type NewReading = z.infer<typeof NewReading>;

export const Reading = z.object({
  id: z.string(),
  gaugeId: z.string(),
  /** The gauge as it was when it was read. */
  gauge: Gauge,
  valuePa: z.number().optional(),
  whyNot: WhyNotRead.optional(),
  note: z.string(),
  takenAt: z.iso.datetime(),
  receivedAt: z.iso.datetime(),
  deviceId: z.string(),
  deviceSeq: z.number().int(),
  replaces: z.string().optional(),
  personId: z.string(),
  personName: z.string(),
  photoIds: z.array(z.string()),
});
export type Reading = z.infer<typeof Reading>;

export const RoundSummary = z.object({
  id: z.string(),
  /** For lists: the title, or the day it began. */
  name: z.string(),
  title: z.string(),
  networkVersion: z.number().int(),
  caseId: z.string(),
  personId: z.string(),
  personName: z.string(),
  startedAt: z.iso.datetime(),
  closedAt: z.iso.datetime().optional(),
  /** Gauges read, and those that could not be; corrections do not count twice. */
  read: z.number().int(),
  notRead: z.number().int(),
});
export type RoundSummary = z.infer<typeof RoundSummary>;

/** Readings by device and number, replaced ones too. */
export const Round = z.object({ ...RoundSummary.shape, networkId: z.string(), readings: z.array(Reading) });
export type Round = z.infer<typeof Round>;

/** Body of POST …/rounds/:roundId/closing: nothing but corrections is taken after it. */
export const RoundClosing = z.strictObject({ closedAt: z.iso.datetime() });
export type RoundClosing = z.infer<typeof RoundClosing>;
