import { z } from 'zod'
import { fileHash, number, saying, uuid, words } from './common'

/** What a signature means (21 CFR 11.50(a)(3)). */
export const SUBMIT_STATEMENT = 'I did or saw what is entered under my name, and this record is complete to my knowledge.'
export const SEAL_STATEMENT = 'I have reviewed this record and countersign it.'

/** Kinds of corrections, questions and the end of a record. */
export const reviewKinds = {
  'correction': { 1: z.object({
    corrects: uuid,
    reason: saying('Say what was wrong'),
    reading: z.union([z.object({ value: number(-76, 176) }).strict(), z.literal('struck')]).nullable(), // for a reading: the right value, or that it does not count
  }).strict() },
  'questioned-settled': { 1: z.object({ entry: uuid, words: saying('Say what you looked at and found') }).strict() },
  'question-asked': { 1: z.object({ about: uuid.nullable(), words: saying('Write the question') }).strict() },
  'question-answered': { 1: z.object({ question: uuid, words: saying('Write the answer') }).strict() },
  /** names the reviewer in the log, so that the seal's root covers their key too */
  'review-begun': { 1: z.object({}).strict() },
  'submitted': { 1: z.object({ statement: z.literal(SUBMIT_STATEMENT), drawing: fileHash, words }).strict() },
  'returned': { 1: z.object({ reason: saying('Say what is missing') }).strict() },
  'sealed': { 1: z.object({
    statement: z.literal(SEAL_STATEMENT),
    drawing: fileHash,
    size: z.number().int().positive(),
    root: z.string().regex(/^[0-9a-f]{64}$/),
    words,
  }).strict() },
}
