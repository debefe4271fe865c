import { z } from 'zod'
import { ROLES } from '../../schemas/people'
import { alertKinds } from './alerts'
import { time, uuid } from './common'

export const VERDICTS = ['within', 'above', 'act', 'discard', 'unknown'] as const
export type Verdict = (typeof VERDICTS)[number]
export const VERDICT_WORDS: Record<Verdict, string> = {
  within: 'within its limit',
  above: 'above its limit',
  act: 'needs an act now',
  discard: 'to be discarded',
  unknown: 'not known: no reading in time',
}

/** What may be wrong with the plant while points are in hand. */
export const PLANT_FAULTS = ['current-above-plate', 'discharge-high', 'suction-below-forecast', 'suction-near-cut-out'] as const
export type PlantFault = (typeof PLANT_FAULTS)[number]

/** Why an act is open on a case, the least pressing first. */
export const ACT_CAUSES = ['hold-short', 'deadline-near', 'act', 'discard'] as const
export type ActCause = (typeof ACT_CAUSES)[number]

/** Who is told without an account. */
export const NOTICE_PARTIES = ['shop', 'monitoring'] as const
export type NoticeParty = (typeof NOTICE_PARTIES)[number]
/** What they are told: that control is away, that nothing comes of it, that it is back, what product was moved or discarded. */
export const NOTICE_SUBJECTS = ['control-away', 'called-off', 'control-back', 'product'] as const
export type NoticeSubject = (typeof NOTICE_SUBJECTS)[number]

/** Kinds that only the server signs. */
export const serverKinds = {
  'signer-named': { 1: z.object({
    device: uuid,
    deviceName: z.string().max(60),
    person: z.union([uuid, z.literal('server')]),
    name: z.string().min(1).max(80),
    role: z.union([z.enum(ROLES), z.literal('server')]),
    publicKey: z.string().regex(/^[A-Za-z0-9_-]{43}$/),
    enrolledAt: time,
  }).strict() },
  'outage-numbered': { 1: z.object({ code: z.string().min(1).max(40) }).strict() },
  'verdict-changed': { 1: z.object({
    caseId: uuid,
    verdict: z.enum(VERDICTS),
    deadline: time.nullable(),
    minutesAbove: z.number().min(0),
    clause: z.string().max(400),
    source: z.string().max(400),
    act: z.string().max(600).nullable(),
    why: z.array(z.string().max(600)).max(40),
    judgedAt: time,
  }).strict() },
  'plant-warned': { 1: z.object({
    fault: z.enum(PLANT_FAULTS),
    about: z.string().min(1).max(60), // a suction group's id, or a point's tag
    words: z.string().min(1).max(600),
    act: z.string().max(600),
    over: z.boolean(), // the reading that it came from has been followed by a better one
    judgedAt: time,
  }).strict() },
  /** an act that no verdict opens by itself: its deadline came near, or its hold grew short */
  'act-opened': { 1: z.object({
    caseId: uuid,
    cause: z.enum(['hold-short', 'deadline-near']),
    deadline: time.nullable(), // when the verdict gets worse; for a short hold, when the limit is reached by the forecast
    openedAt: time,
  }).strict() },
  /** an act of a short hold is asked for no more: readings since show that the case holds */
  'act-lapsed': { 1: z.object({ caseId: uuid, holdMinutes: z.number().min(0).nullable(), judgedAt: time }).strict() }, // null: its limit is never reached
  /** a mail to somebody without an account was handed in */
  'notice-sent': { 1: z.object({ mail: uuid, party: z.enum(NOTICE_PARTIES), subject: z.enum(NOTICE_SUBJECTS), name: z.string().max(80), to: z.string().min(1).max(254), sentAt: time }).strict() },
  /** whoever has the link of a notice said that they have read it, under a name that they gave */
  'notice-acknowledged': { 1: z.object({ mail: uuid, party: z.enum(NOTICE_PARTIES), name: z.string().trim().min(1).max(80) }).strict() },
  'entry-refused': { 1: z.object({ device: uuid, n: z.number().int().min(1), id: uuid, hash: z.string().regex(/^[0-9a-f]{64}$/), reason: z.string().max(1000) }).strict() },
  ...alertKinds,
}
