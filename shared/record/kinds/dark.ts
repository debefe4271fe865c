import { z } from 'zod'
import { photos, saying, time, words } from './common'

/** Kinds of the time without control. */
export const darkKinds = {
  'went-dark': { 1: z.object({ lostAt: time }).strict() }, // a decision: the gate's
  'control-lost': { 1: z.object({ lostAt: time, words: saying('Say what happened'), photos }).strict() }, // a fact: never refused
  'step-ticked': { 1: z.object({ step: z.string().min(1).max(40), state: z.enum(['begun', 'done']), words }).strict() },
  /** a supervisor's decision; the technician carries it out and signs `turned-back` */
  'turn-back-ordered': { 1: z.object({ reason: saying('Say why') }).strict() },
  'turned-back': { 1: z.object({ reason: saying('Say why') }).strict() },
  'control-back': { 1: z.object({ backAt: time, words }).strict() },
  'silence-announced': { 1: z.object({ until: time, words }).strict() }, // no signal until then: nobody need worry
  'note-added': { 1: z.object({ words: saying('Write the note'), photos }).strict() },
}
