import { z } from 'zod'
import { handPositionSchema } from '../../schemas/point-kinds'
import { CHECK_IDS } from '../checks'
import { number, photos, saying, tag, time, uuid, words } from './common'

/** What a person sees of a point after putting it in hand. */
export const SEEN_IN_HAND = ['running', 'not-running', 'cycling', 'open', 'closed', 'on', 'off', 'at-position', 'not-at-position', 'as-found'] as const
export type SeenInHand = (typeof SEEN_IN_HAND)[number]
/** What a person sees of a point after returning it to the controller. */
export const SEEN_IN_AUTO = ['answers', 'not-called', 'no-answer'] as const
export type SeenInAuto = (typeof SEEN_IN_AUTO)[number]

/** Kinds of checks and of points, in hand and back in auto. */
export const handKinds = {
  'check-signed': { 1: z.object({
    check: z.enum(CHECK_IDS),
    outcome: z.enum(['done', 'needless']),
    words, // required where needless
    photos,
  }).strict() },
  'point-in-hand': { 1: z.object({
    tag,
    hand: handPositionSchema,
    seen: z.enum(SEEN_IN_HAND),
    value: z.object({ number: number(0, 100_000), unit: z.enum(['A', 'Hz', '%']) }).strict().nullable(),
    until: time, // by when it must be off again
    reason: words, // where the position differs from the plan's
    words,
    photos,
  }).strict() },
  'point-excused': { 1: z.object({ tag, reason: saying('Say why it cannot be put in hand'), measure: saying('Say what is done instead'), photos }).strict() },
  'point-in-auto': { 1: z.object({ tag, seen: z.enum(SEEN_IN_AUTO), words, photos }).strict() },
  'point-proven': { 1: z.object({ tag, words, photos }).strict() },
  'left-in-exception': { 1: z.object({
    points: z.array(z.object({ tag, owner: saying('Name who owns it'), by: time, reason: saying('Say why') }).strict()).min(1, 'Name at least one point').max(2000),
  }).strict() },
  'hand-back-closed': { 1: z.object({ words }).strict() },
  'defrost-watched': { 1: z.object({ circuitId: uuid, words: saying('Say what you saw') }).strict() },
}
