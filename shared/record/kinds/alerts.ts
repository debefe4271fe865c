import { z } from 'zod'
import { time, uuid } from './common'

/** What may be alerted. How each begins and is over stands in server/utils/alerts. */
export const ALERTS = [
  'round-late', 'round-missed', 'limit-near', 'act-due', 'discard-due', 'pressure', 'overrun', 'turn-back-past',
  'override-past', 'left-in-hand', 'unheard', 'worker-silent',
] as const
export type AlertName = (typeof ALERTS)[number]

/** Alerts as a list names them. */
export const ALERT_WORDS: Record<AlertName, string> = {
  'round-late': 'Round late',
  'round-missed': 'Round missed',
  'limit-near': 'Limit near',
  'act-due': 'Act needed',
  'discard-due': 'Product to be discarded',
  'pressure': 'Pressure out of bounds',
  'overrun': 'Work over its time',
  'turn-back-past': 'Past the latest turn-back',
  'override-past': 'Override past its time',
  'left-in-hand': 'Left in hand at hand back',
  'unheard': 'Phone not heard from',
  'worker-silent': 'Lone worker silent',
}

/** So many people in a row are told, each after the one before has not acknowledged. */
export const ALERT_LEVELS = 3
export const ALERT_WORDS_MAX = 600

/** An alert's own name within its outage: what it is, about what, the how-manieth of that. */
const key = z.string().min(3).max(160)
const level = z.number().int().min(1).max(ALERT_LEVELS)
const told = z.array(z.string().min(1).max(80)).max(200) // printed names, as they were then

/** Kinds of alerts; only the server signs them, an acknowledgement in the name of whoever gave it. */
export const alertKinds = {
  'alert-raised': { 1: z.object({
    key,
    alert: z.enum(ALERTS),
    about: z.array(z.string().min(1).max(80)).min(1).max(2000), // cases' ids, points' tags, people's ids, by what it is
    level, // the last level that is told at once
    words: z.string().min(1).max(ALERT_WORDS_MAX), // site, what, until when, and what to do
    until: time.nullable(), // when what is feared comes to pass
    to: told,
    judgedAt: time,
  }).strict() },
  /** nobody has acknowledged it: the next ones are told */
  'alert-passed-on': { 1: z.object({ key, level, to: told, judgedAt: time }).strict() },
  'alert-acknowledged': { 1: z.object({ key, person: uuid, name: z.string().min(1).max(80), acknowledgedAt: time }).strict() },
  /** what it warned of is so no more */
  'alert-over': { 1: z.object({ key, judgedAt: time }).strict() },
}
