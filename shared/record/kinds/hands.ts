import { z } from 'zod'
import { number, saying, tag, time, uuid, words } from './common'
import { handKinds } from './hand'
import { planKinds } from './plan'
import { roundKinds } from './rounds'

/** What may be open when an outage changes hands. */
export const OPEN_MATTERS = ['in-hand', 'proof-due', 'act', 'late-reading', 'question', 'questioned', 'voice'] as const
export type OpenMatter = (typeof OPEN_MATTERS)[number]

const personName = z.string().trim().min(1).max(80)
/** `about`: a point's tag, a case's id, or the id of an entry, by what it is. */
const about = z.union([uuid, tag])
const matter = z.enum(OPEN_MATTERS)

/** The versions in which a spoken decision is written down; another one would be a version of the whole kind. */
export const SPOKEN_VERSIONS = { 'margin-accepted': 1, 'left-in-exception': 1, 'decided-otherwise': 2 } as const

/** A supervisor's decision as it was spoken: the body that the supervisor would have signed, by its kind. */
const spoken = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('margin-accepted'), body: planKinds['margin-accepted'][1] }).strict(),
  z.object({ kind: z.literal('left-in-exception'), body: handKinds['left-in-exception'][1] }).strict(),
  z.object({ kind: z.literal('decided-otherwise'), body: roundKinds['decided-otherwise'][2] }).strict(),
])
export type Spoken = z.output<typeof spoken>

/** Kinds of changing hands, and of decisions given by voice. */
export const handsKinds = {
  'hands-offered': { 1: z.object({
    to: uuid,
    toName: personName, // who takes it may not be named in the log yet
    size: number(1, 1_000_000).int(), // entries that the leaving one had seen
    open: z.array(z.object({ what: matter, about, words: z.string().min(1).max(400) }).strict()).max(6000),
    words,
  }).strict() },
  'hands-withdrawn': { 1: z.object({ offer: uuid, reason: saying('Say why') }).strict() },
  'hands-refused': { 1: z.object({ offer: uuid, reason: saying('Say why') }).strict() },
  'hands-taken': { 1: z.object({
    from: uuid,
    offer: uuid.nullable(), // null: a supervisor takes over from somebody who offered nothing
    looked: z.array(z.object({ what: matter, about, found: words }).strict()).max(6000),
    words, // required where there is no offer
  }).strict() },

  'voice-decision': { 1: z.object({
    supervisor: uuid,
    supervisorName: personName,
    givenAt: time,
    words: saying('Write the words that were said'),
    decision: spoken,
  }).strict() },
  'voice-confirmed': { 1: z.object({ decision: uuid, words }).strict() },
  'voice-denied': { 1: z.object({ decision: uuid, reason: saying('Say why') }).strict() },
}
