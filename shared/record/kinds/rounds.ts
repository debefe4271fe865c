import { z } from 'zod'
import { INSTRUMENT_KINDS } from '../../schemas/equipment'
import { number, photos, saying, uuid, words } from './common'

export const ACTS = ['cooled', 'moved', 'night-covers', 'ice', 'used', 'emptied', 'discarded', 'restored-by-hand', 'accepted-warm'] as const
export type Act = (typeof ACTS)[number]
/** Acts, as they are chosen and read. */
export const ACT_WORDS: Record<Act, string> = {
  'cooled': 'Cooled back within the limit',
  'moved': 'Moved to another case',
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
  'act-signed': { 1: z.object({
    caseId: uuid,
    act: z.enum(ACTS),
    product: words,
    quantity: z.number().finite().positive('More than nothing').max(1_000_000).nullable(),
    unit: z.string().trim().max(20).default(''),
    place: words,
    words,
    photos,
  }).strict() },
  'decided-otherwise': { 1: z.object({ caseId: uuid, reason: saying('Give the reason and the clause'), photos }).strict() },
}
