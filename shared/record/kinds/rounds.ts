import { z } from 'zod'
import { INSTRUMENT_KINDS } from '../../schemas/equipment'
import { number, photos, saying, time, uuid, words } from './common'

/** Acts as version 1 of `act-signed` had them. */
const ACTS_1 = ['cooled', 'moved', 'night-covers', 'ice', 'used', 'emptied', 'discarded', 'restored-by-hand', 'accepted-warm'] as const
/** Acts that are signed now: that a case was cooled is no longer claimed, a reading proves it. */
export const ACTS = ['cool-by', 'moved', 'night-covers', 'ice', 'used', 'discarded', 'restored-by-hand', 'emptied', 'accepted-warm'] as const
export type Act = (typeof ACTS)[number] | (typeof ACTS_1)[number]
/** Acts, as they are chosen and read. */
export const ACT_WORDS: Record<Act, string> = {
  'cool-by': 'Cool by a given time',
  'cooled': 'Cooled back within the limit',
  'moved': 'Moved to another place',
  'night-covers': 'Night covers drawn',
  'ice': 'Ice or dry ice laid',
  'used': 'Used or sold at once',
  'emptied': 'Case emptied',
  'discarded': 'Discarded',
  'restored-by-hand': 'Refrigeration restored by hand',
  'accepted-warm': 'Accepted as started warm',
}

/** Highest reading number of a round, temperatures in the unit that stands beside them. */
const round = z.number().int().min(0).max(1000)

const quantity = z.number().finite().positive('More than nothing').max(1_000_000).nullable()
const unit = z.string().trim().max(20).default('')

/** Kinds of rounds: product temperatures, plant pressures, and what was done about a verdict. */
export const roundKinds = {
  'reading-taken': { 1: z.object({
    round,
    caseId: uuid,
    value: number(-76, 176),
    unit: z.enum(['F', 'C']),
    method: z.enum(INSTRUMENT_KINDS),
    instrumentId: uuid.nullable(),
    words,
    photos,
  }).strict().refine(reading => reading.unit === 'F' || (reading.value >= -60 && reading.value <= 80), { path: ['value'], message: 'Between -60 and 80 °C' }) },
  'pressure-read': { 1: z.object({
    round,
    suctionGroupId: uuid,
    suctionPsig: number(-15, 2000),
    dischargePsig: number(-15, 2500).nullable(),
    words,
  }).strict() },
  'act-signed': {
    1: z.object({
      caseId: uuid,
      act: z.enum(ACTS_1),
      product: words,
      quantity,
      unit,
      place: words,
      words,
      photos,
    }).strict(),
    2: z.object({
      caseId: uuid,
      act: z.enum(ACTS),
      product: words,
      quantity,
      unit,
      place: words,
      coolBy: time.nullable().default(null), // by when it is cooled: a promise that a reading proves
      takenBy: words, // who took what was discarded
      left: z.boolean().default(false), // product is left in the case after it
      words,
      photos,
    }).strict(),
  },
  'decided-otherwise': {
    1: z.object({ caseId: uuid, reason: saying('Give the reason and the clause'), photos }).strict(),
    2: z.object({ caseId: uuid, reason: saying('Give the reason'), clause: saying('Name the clause that you rely on'), photos }).strict(),
  },
  /** a thermometer held in crushed ice and water */
  'instrument-checked': { 1: z.object({
    instrumentId: uuid,
    value: number(-76, 176),
    unit: z.enum(['F', 'C']),
    within: z.boolean(), // of the ice point, to its accuracy
    words,
  }).strict() },
}
